/** Makes pictures off the page's own thread; bundled by itself and started by `pictureThread.web.ts`. */
import { makePicture, type PictureJob } from '@/hooks/planes/makePicture';

interface Scope {
  onmessage: ((event: { data: { id: number; job: PictureJob } }) => void) | null;
  postMessage(message: unknown, transfer?: ArrayBufferLike[]): void;
}
const scope = globalThis as unknown as Scope;

scope.onmessage = ({ data: { id, job } }) => {
  try {
    const plane = makePicture(job);
    scope.postMessage({ id, plane }, [plane.values.buffer]);
  } catch (error) {
    scope.postMessage({ id, problem: error instanceof Error ? error.message : String(error) });
  }
};
