import type { Parameter } from '@/shared/contract/fits';
import type { Shell } from '@/shared/contract/shells';

const COLUMNS: [name: string, value: (s: Shell) => string | number | null | undefined][] = [
  ['designation', (s) => s.designation],
  ['name', (s) => s.name],
  ['region', (s) => s.regionName],
  ['status', (s) => s.status],
  ...parameter('l_deg', (s) => s.adopted?.l),
  ...parameter('b_deg', (s) => s.adopted?.b),
  ...parameter('theta_deg', (s) => s.adopted?.theta),
  ...parameter('v_sys_km_s', (s) => s.adopted?.vSys),
  ...parameter('v_exp_km_s', (s) => s.adopted?.vExp),
  ['distance_pc', (s) => s.adopted?.distance?.pc],
  ['distance_error_pc', (s) => s.adopted?.distance?.errorPc],
  ['distance_source', (s) => s.adopted?.distance?.source],
  ...parameter('radius_pc', (s) => s.adopted?.radius),
  ...parameter('age_myr', (s) => s.adopted?.age),
  ['age_factor', (s) => s.adopted?.ageFactor],
  ['chi2_per_dof', (s) => s.adopted?.chi2PerDof],
  ['marks', (s) => s.adopted?.marks],
  ['model', (s) => s.adopted?.model],
  ['warnings', (s) => s.adopted?.warnings.join(' ')],
  ['shell_id', (s) => s.id],
  ['fit_id', (s) => s.adoptedFitId],
];

/** An empty field means: not known, or unbounded. */
function parameter(name: string, of: (s: Shell) => Parameter | null | undefined): typeof COLUMNS {
  return [
    [name, (s) => of(s)?.value],
    [`${name}_se`, (s) => of(s)?.se],
    [`${name}_lo`, (s) => of(s)?.lo],
    [`${name}_hi`, (s) => of(s)?.hi],
  ];
}

/** RFC 4180, UTF-8, one line a shell. */
export function catalogueCsv(shells: Shell[]): string {
  const lines = [COLUMNS.map(([name]) => name), ...shells.map((s) => COLUMNS.map(([, value]) => value(s)))];
  return lines.map((line) => line.map(field).join(',') + '\r\n').join('');
}

function field(value: string | number | null | undefined): string {
  if (value === null || value === undefined) return '';
  if (typeof value === 'number') return String(value);
  // a name that begins like a formula must stay text in a spreadsheet (OWASP, CSV injection)
  const text = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
