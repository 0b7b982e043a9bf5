import { Upload, type DetailedError, type UploadOptions } from 'tus-js-client';
import type { SignedIn } from './harness';

export interface UploadOutcome {
  cubeId: string | null;
  /** The problem body of a refusal. */
  problem: Record<string, unknown> | null;
  status: number | null;
}

/** Upload bytes as the client does. */
export function upload(
  who: SignedIn,
  base: string,
  regionId: string,
  bytes: Buffer,
  options: { filename?: string; chunkSize?: number } & Partial<UploadOptions> = {},
): Promise<UploadOutcome> {
  const { filename = 'cube.fits', chunkSize = 1 << 20, ...rest } = options;
  return new Promise((resolve) => {
    let cubeId: string | null = null;
    new Upload(bytes, {
      endpoint: `${base}/api/v1/uploads`,
      metadata: { filename, regionId },
      chunkSize,
      retryDelays: null as never,
      headers: { 'X-CSRF-Token': who.csrf, Cookie: cookieOf(who, base) },
      onAfterResponse: (_req, res) => void (cubeId = res.getHeader('Cube-Id') ?? cubeId),
      onSuccess: () => resolve({ cubeId, problem: null, status: 204 }),
      onError: (error) => {
        const response = (error as DetailedError).originalResponse;
        const body = response?.getBody() ?? '';
        resolve({ cubeId, problem: body ? JSON.parse(body) : null, status: response?.getStatus() ?? null });
      },
      ...rest,
    }).start();
  });
}

export const cookieOf = (who: SignedIn, base: string): string =>
  who.agent.jar
    .getCookies({ domain: '127.0.0.1', path: '/', secure: base.startsWith('https'), script: false } as never)
    .toValueString();
