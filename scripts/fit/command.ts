import { Problem } from '@/shared/contract/problem';
import { fitShell } from '@/shared/shell/fit';
import type { FitInput } from '@/shared/shell/fitInput';
import type { FitResult } from '@/shared/shell/fitResult';
import { openDiskSource } from '@/server/files/byteSource';
import { readCubeHead } from '@/server/files/cubeHead';
import { parse, type Request } from './arguments';
import { marksOnCube, marksOnSky, readJson, type Placed } from './marksFiles';
import { traceOnCube } from './traceOnCube';

/**
 * Fit the marks of a file, with or without the cube they were made on.
 *
 * @returns the fit as one JSON object
 * @throws Problem what the input is at fault with
 */
export async function fitCommand(args: readonly string[]): Promise<string> {
  const request = parse(args);
  const json = await readJson(request.marks);
  if (request.cube === null) {
    const placed = marksOnSky(json, request.marks);
    return written(fitShell(constrained(placed.input, request), request.options), placed);
  }
  return onCube(request.cube, json, request);
}

async function onCube(file: string, json: unknown, request: Request): Promise<string> {
  const { options, trace } = request;
  const source = await openDiskSource(file).catch((error: Error) => {
    throw new Problem('invalid-input', `${file} cannot be opened: ${error.message}.`, { field: 'cube' });
  });
  try {
    const placed = marksOnCube(await readCubeHead(source), json, request.marks);
    const input = constrained(placed.input, request);
    if (trace === null) return written(fitShell(input, options), placed);
    const around = fitShell(input, { ...options, bootstrap: 0, extras: false });
    const traced = await traceOnCube(source, around, trace);
    const { vSys, constraints } = input;
    const fit = fitShell({ ...traced.input, vSys, constraints }, options);
    return written({ ...fit, extra: { ...fit.extra, trace: traced.outcome } } as FitResult, placed);
  } finally {
    await source.close();
  }
}

/** The input with what the command line says of its parameters, which counts before what the file says. */
function constrained({ vSys, ...input }: FitInput, { constraints }: Request): FitInput {
  return { ...input, constraints, ...('vSys' in constraints ? {} : { vSys }) };
}

function written({ model, rings, ...rest }: FitResult, { channelOf }: Placed): string {
  const numbered = rings.map((ring) => ({ channel: channelOf(ring.velocity), ...ring }));
  const fit = { model, status: 'done', ...rest, rings: numbered };
  return JSON.stringify(fit, null, 2);
}
