// @ts-check
/** @typedef {Record<string, unknown>} Fields */

/** @type {Record<number, string>} */
const levels = { 10: 'trace', 20: 'debug', 30: '', 40: 'WARN', 50: 'ERROR', 60: 'FATAL' };
const hidden = new Set('level time pid hostname name msg req res responseTime v'.split(' '));
const isError = (/** @type {unknown} */ value) =>
  typeof value === 'object' && value !== null && 'stack' in value;

/**
 * One line of a process's output as a person reads it: time, who, level when it matters, what, and the rest as
 * key=value. What is not one of our JSON lines is passed on as it is.
 *
 * @param {string} who  as in "server"
 * @param {string} line
 * @param {Date} [now]  for lines without a time of their own
 */
export function readable(who, line, now = new Date()) {
  const fields = parse(line);
  if (!fields) return `${clock(now)} ${who.padEnd(6)} ${line}`;
  const level = levels[Number(fields.level)] ?? String(fields.level);
  const text = [level, request(fields) ?? String(fields.msg ?? ''), rest(fields)].filter(Boolean).join('  ');
  const time = new Date(/** @type {number | string} */ (fields.time ?? now));
  return `${clock(Number.isNaN(time.getTime()) ? now : time)} ${who.padEnd(6)} ${text}${trace(fields)}`;
}

/** @param {string} line @returns {Fields | null} */
function parse(line) {
  if (!line.startsWith('{')) return null;
  try {
    const value = JSON.parse(line);
    return typeof value.level === 'number' ? value : null;
  } catch {
    return null;
  }
}

/** @param {Fields} fields @returns {string | undefined} "GET /api/v1/regions 200 12 ms" */
function request({ req, res, responseTime, msg }) {
  const { method, url } = /** @type {{ method?: string, url?: string }} */ (req ?? {});
  const { statusCode } = /** @type {{ statusCode?: number }} */ (res ?? {});
  if (!method || !statusCode) return undefined;
  const took = typeof responseTime === 'number' ? ` ${responseTime} ms` : '';
  return `${method} ${url} ${statusCode}${took}${msg && !/^request (completed|errored)$/.test(String(msg)) ? `  ${msg}` : ''}`;
}

/** @param {Fields} fields */
const rest = (fields) =>
  Object.entries(fields)
    .filter(([key, value]) => !hidden.has(key) && !isError(value) && value !== undefined && value !== null)
    .map(([key, value]) => `${key}=${typeof value === 'object' ? JSON.stringify(value) : value}`)
    .join(' ');

/** Of whichever field carries an error. @param {Fields} fields */
function trace(fields) {
  const found = /** @type {{ stack?: string } | undefined} */ (Object.values(fields).find(isError));
  return found?.stack ? `\n${found.stack.replace(/^/gm, '         | ')}` : '';
}

/** @param {Date} time */
const clock = (time) => time.toTimeString().slice(0, 8);
