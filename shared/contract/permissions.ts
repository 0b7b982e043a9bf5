/**
 * Who may do what: the one table that services refuse by and screens hide by.
 * A person has one role in a team; everything in a team's regions is visible to each of its members.
 */
export const ROLES = ['lead', 'analyst', 'reviewer', 'reader'] as const;
export type Role = (typeof ROLES)[number];

export const PERMISSIONS = {
  'region.read': ['lead', 'analyst', 'reviewer', 'reader'],
  'region.create': ['lead', 'analyst'],
  'region.edit': ['lead', 'analyst'],
  'cube.read': ['lead', 'analyst', 'reviewer', 'reader'],
  'cube.upload': ['lead', 'analyst'],
  'cube.manage': ['lead', 'analyst'],
  'shell.read': ['lead', 'analyst', 'reviewer', 'reader'],
  'shell.create': ['lead', 'analyst'],
  'shell.edit': ['lead', 'analyst'],
  'reading.write': ['lead', 'analyst', 'reviewer'],
  'fit.run': ['lead', 'analyst', 'reviewer'],
  'fit.adopt': ['lead', 'analyst'],
  'distance.add': ['lead', 'analyst'],
  'team.manage': ['lead'],
} as const satisfies Record<string, readonly Role[]>;

export type Action = keyof typeof PERMISSIONS;

export const may = (role: Role | null | undefined, action: Action): boolean =>
  role != null && (PERMISSIONS[action] as readonly Role[]).includes(role);
