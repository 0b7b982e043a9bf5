// Where there are no workers (native, tests); the web build takes pictureThread.web.ts.
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { makePicture, type PictureJob } from '@/hooks/planes/makePicture';

/** Make a picture without holding up the page. */
export const pictureInThread = async (job: PictureJob): Promise<ChannelPlane> => makePicture(job);
