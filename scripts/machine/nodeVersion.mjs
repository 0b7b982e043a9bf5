// @ts-check
import { Stop } from './stop.mjs';

const wanted = [20, 19]; // the first 20 that can require ES modules

/** @param {string} [version] as in process.versions.node */
export function checkNode(version = process.versions.node) {
  const [major = 0, minor = 0] = version.split('.').map(Number);
  const [needMajor = 0, needMinor = 0] = wanted;
  if (major > needMajor || (major === needMajor && minor >= needMinor)) return;
  throw new Stop(`Node ${wanted.join('.')} or newer is needed; this is Node ${version}.`);
}
