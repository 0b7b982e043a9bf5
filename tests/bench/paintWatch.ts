/** One picture of a channel, milliseconds since the key before it, or since navigation when there was none. */
export interface Paint {
  channel: number;
  block: number;
  /** The canvas was drawn. */
  drawn: number;
  /** The frame that holds it was handed over to be shown. */
  shown: number;
}

/**
 * Runs in the page before its own code, as text. It listens to the mark that the channel map sets when it has drawn,
 * and waits for the frame after it; a key press begins a new count at the time the browser gives the event.
 */
export const paintWatch = `{
  let began = 0;
  let paints = [];
  let waiting = null;
  const look = () => {
    const found = waiting && paints.find((p) => p.shown !== null && waiting.holds(p));
    if (!found) return;
    waiting.resolve(found);
    waiting = null;
  };
  const mark = performance.mark.bind(performance);
  performance.mark = (name, options) => {
    const entry = mark(name, options);
    if (name === 'outswell:channel-painted') {
      const paint = { ...options.detail, drawn: entry.startTime - began, shown: null };
      paints.push(paint);
      const since = began;
      requestAnimationFrame(() => {
        const { port1, port2 } = new MessageChannel();
        port1.onmessage = () => {
          paint.shown = performance.now() - since;
          port1.close();
          look();
        };
        port2.postMessage(0);
      });
    }
    return entry;
  };
  addEventListener(
    'keydown',
    (event) => {
      began = event.timeStamp;
      paints = [];
    },
    true,
  );
  globalThis.paintWatch = {
    first: (holds) => new Promise((resolve) => {
      waiting = { holds, resolve };
      look();
    }),
  };
}`;
