import { execFileSync } from 'node:child_process';
import { cpus, loadavg, totalmem } from 'node:os';

/** The load of the last minute: how much else was running. */
export const load = () => loadavg()[0]!.toFixed(1);

export function describeMachine(): string {
  const all = cpus();
  const numpy = numpyPython();
  return (
    `${all[0]?.model.trim() ?? 'unknown processor'}, ${all.length} cores, ` +
    `${(totalmem() / 2 ** 30).toFixed(0)} GiB; node ${process.versions.node}` +
    (numpy ? `; python ${numpy.version}, numpy ${numpy.numpy}` : '')
  );
}

/** A Python that has numpy: Debian's own before another one on the path. Null where there is none. */
export function numpyPython(): { program: string; version: string; numpy: string } | null {
  const ask = 'import platform, numpy; print(platform.python_version(), numpy.__version__)';
  for (const program of ['/usr/bin/python3', 'python3'])
    try {
      const text = execFileSync(program, ['-c', ask], {
        encoding: 'utf8',
        stdio: ['ignore', 'pipe', 'ignore'],
      });
      const [version = '', numpy = ''] = text.trim().split(' ');
      return { program, version, numpy };
    } catch {
      // not there, or without numpy
    }
  return null;
}
