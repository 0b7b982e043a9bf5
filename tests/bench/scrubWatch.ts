/** Turns of channels and when their pictures were drawn, milliseconds of the page's clock. */
export interface Scrub {
  turns: { channel: number; at: number }[];
  paints: { channel: number; block: number; standIn: boolean; at: number }[];
}

/**
 * Runs in the page before its own code, as text: presses keys at a rate and notes when the map has drawn, from the
 * marks that it sets.
 */
export const scrubWatch = `{
  const paints = [];
  let turns = [];
  let heard = null;
  let blank = 0;
  const mark = performance.mark.bind(performance);
  performance.mark = (name, options) => {
    const entry = mark(name, options);
    if (name === 'outswell:channel-painted') {
      // the drawing is done when this is set
      paints.push({ ...options.detail, at: performance.now() });
      heard?.();
    }
    if (name === 'outswell:channel-asked' && turns.length > 0) turns[turns.length - 1].channel = options.detail.channel;
    return entry;
  };
  const press = (key, target) =>
    target.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
  const rest = (ms) => new Promise((resolve) => setTimeout(resolve, ms));
  /** Until the next frame has been handed over to be shown. */
  const frame = () =>
    new Promise((resolve) =>
      requestAnimationFrame(() => {
        const { port1, port2 } = new MessageChannel();
        port1.onmessage = () => {
          port1.close();
          resolve();
        };
        port2.postMessage(0);
      }),
    );
  globalThis.scrubWatch = {
    paints,
    async untilFull() {
      while (!paints.some((p) => p.block === 1)) await rest(20);
    },
    async scrub(channels, rate) {
      turns = [];
      const first = paints.length;
      const began = performance.now();
      await new Promise((resolve) => {
        let done = 0;
        const turn = () => {
          const due = began + (done * 1000) / rate;
          if (performance.now() < due - 0.5) return void setTimeout(turn, Math.max(due - performance.now() - 0.5, 0));
          turns.push({ channel: -1, at: performance.now() });
          press('ArrowRight', document.body);
          if (++done === channels) return resolve();
          setTimeout(turn, 0);
        };
        turn();
      });
      await rest(300);
      return { turns, paints: paints.slice(first) };
    },
    async looks(keys, selector, times) {
      const taken = [];
      for (let i = 0; i < times; i++) {
        await rest(120);
        const began = performance.now();
        const drawn = new Promise((resolve) => (heard = resolve));
        press(keys[i % keys.length], selector ? document.querySelector(selector) : document.body);
        await Promise.race([drawn, rest(5000).then(() => Promise.reject(new Error('The map was not painted anew.')))]);
        const painted = paints[paints.length - 1].at - began;
        await frame();
        taken.push({ painted, shown: performance.now() - began });
        heard = null;
      }
      return taken;
    },
    /** Counts frames in which the map is dimmed for want of a picture, or shows nothing at all. */
    watchBlank() {
      const look = () => {
        const canvas = document.querySelector('[data-testid="raster"]');
        if (!canvas || canvas.style.opacity !== '1') blank++;
        requestAnimationFrame(look);
      };
      requestAnimationFrame(look);
    },
    blankFrames: () => blank,
  };
}`;
