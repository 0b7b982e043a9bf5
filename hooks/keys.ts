/** The key of each resource in the cache: its path below /api/v1, so that a key is also what to ask for. */
export const keys = {
  me: () => '/me',
  provider: () => '/auth/provider',
  members: () => '/members',
  tokens: () => '/tokens',
  regions: () => '/regions',
  region: (id: string) => `/regions/${id}`,
  uploads: (regionId: string) => `/regions/${regionId}/uploads`,
  cubes: (regionId: string) => `/regions/${regionId}/cubes`,
  cube: (id: string) => `/cubes/${id}`,
  images: (regionId: string) => `/regions/${regionId}/images`,
  image: (id: string) => `/images/${id}`,
  header: (cubeId: string) => `/cubes/${cubeId}/header`,
  channels: (cubeId: string) => `/cubes/${cubeId}/channels`,
  spectrum: (cubeId: string, query = '') => `/cubes/${cubeId}/spectrum${query && `?${query}`}`,
  shells: (regionId: string) => `/regions/${regionId}/shells`,
  catalogue: (query: string) => `/shells${query && `?${query}`}`,
  shell: (id: string) => `/shells/${id}`,
  reading: (shellId: string) => `/shells/${shellId}/readings/mine`,
  fits: (shellId: string) => `/shells/${shellId}/fits`,
  fit: (id: string) => `/fits/${id}`,
  fitMarks: (id: string) => `/fits/${id}/marks`,
  fitDraws: (id: string) => `/fits/${id}/draws`,
  traces: (shellId: string) => `/shells/${shellId}/traces`,
  trace: (id: string) => `/traces/${id}`,
  distances: (shellId: string) => `/shells/${shellId}/distances`,
} as const;

/** Whether a key is the catalogue, whatever its filters. */
export const isCatalogue = (key: unknown): boolean =>
  typeof key === 'string' && (key === '/shells' || key.startsWith('/shells?'));
