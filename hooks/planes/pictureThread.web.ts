import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import type { PictureJob } from '@/hooks/planes/makePicture';

interface Waiting {
  resolve: (plane: ChannelPlane) => void;
  reject: (error: Error) => void;
}
const waiting = new Map<number, Waiting>();
let worker: Worker | null = null;
let last = 0;

/** Make a picture without holding up the page: in a thread that is started with the first one. */
export function pictureInThread(job: PictureJob): Promise<ChannelPlane> {
  worker ??= started();
  const id = ++last;
  return new Promise((resolve, reject) => {
    waiting.set(id, { resolve, reject });
    worker!.postMessage({ id, job });
  });
}

function started(): Worker {
  // the bundler finds the worker by this form
  const made = new Worker(new URL('./pictureWorker', window.location.href));
  made.onmessage = ({ data }: MessageEvent<{ id: number; plane?: ChannelPlane; problem?: string }>) => {
    const asked = waiting.get(data.id);
    waiting.delete(data.id);
    if (data.plane) asked?.resolve(data.plane);
    else asked?.reject(new Error(data.problem));
  };
  made.onerror = () => {
    for (const { reject } of waiting.values()) reject(new Error('The picture could not be made.'));
    waiting.clear();
    worker = null; // the next one is tried afresh
  };
  return made;
}
