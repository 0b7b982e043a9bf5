import { request } from 'node:http';
import type { LiveEvent } from '@/shared/contract/events';
import type { Product, SignedIn } from './harness';
import { cookieOf } from './uploading';

/** The live events as an open page of that person gets them. */
export function listen(
  product: Product,
  who: SignedIn,
): { events: LiveEvent[]; close: () => void; open: Promise<number> } {
  const events: LiveEvent[] = [];
  const call = request(`${product.url}/api/v1/events`, { headers: { Cookie: cookieOf(who, product.url) } });
  const open = new Promise<number>((resolve) => {
    call.on('response', (res) => {
      resolve(res.statusCode!);
      res.setEncoding('utf8').on('data', (text: string) => {
        for (const [, json] of text.matchAll(/^data: (.*)$/gm)) events.push(JSON.parse(json!));
      });
    });
  });
  call.on('error', () => undefined).end();
  return { events, open, close: () => call.destroy() };
}
