const MINUS = '\u2212';

/** '1.3 GB', in powers of ten as file managers and the server's messages count. */
export function fileSize(bytes: number): string {
  const units = ['B', 'kB', 'MB', 'GB', 'TB'];
  let n = Math.max(0, bytes);
  let i = 0;
  while (n >= 999.5 && i < units.length - 1) {
    n /= 1000;
    i++;
  }
  return `${i === 0 ? Math.round(n) : n < 9.95 ? n.toFixed(1) : Math.round(n)} ${units[i]}`;
}

/** '12 s', '3 min', '1 h 20 min'. */
export function duration(seconds: number): string {
  if (seconds < 90) return `${Math.max(1, Math.round(seconds))} s`;
  const minutes = Math.round(seconds / 60);
  if (minutes < 90) return `${minutes} min`;
  const hours = Math.floor(minutes / 60);
  return minutes % 60 ? `${hours} h ${minutes % 60} min` : `${hours} h`;
}

/** '1 cube', '3 cubes'. */
export const count = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;

/** 'just now', '5 min ago', '3 h ago', then the date. */
export function ago(iso: string, now = Date.now()): string {
  const seconds = (now - Date.parse(iso)) / 1000;
  if (seconds < 60) return 'just now';
  if (seconds < 3600) return `${Math.round(seconds / 60)} min ago`;
  if (seconds < 86_400) return `${Math.round(seconds / 3600)} h ago`;
  return day(iso);
}

/** '3 Jun 2026'. */
export const day = (iso: string): string =>
  new Date(iso).toLocaleDateString('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });

/** '3 Jun 2026, 14:05'. */
export const moment = (iso: string): string =>
  `${day(iso)}, ${new Date(iso).toLocaleTimeString('en-GB', { hour: '2-digit', minute: '2-digit' })}`;

/** Fixed decimals with a true minus sign. */
export const decimals = (value: number, places: number): string => {
  const text = Math.abs(value).toFixed(places);
  return value < 0 && /[1-9]/.test(text) ? MINUS + text : text;
};
