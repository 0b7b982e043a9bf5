import type { Page } from 'playwright-core';

/** Put into pages before they load: adds up what jumps without having been asked to (the browser's layout shifts). */
const WATCH = `
  window.outswellShift = 0;
  window.outswellShifts = [];
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) {
      if (entry.hadRecentInput) continue;
      window.outswellShift += entry.value;
      const moved = entry.sources.map((s) => s.node && (s.node.outerHTML ?? s.node.textContent ?? '').slice(0, 120));
      window.outswellShifts.push({ value: entry.value, moved });
    }
  }).observe({ type: 'layout-shift', buffered: true });
`;

export const watchShift = (page: Page) => page.addInitScript(WATCH);

/** The sum of shifts since the page was loaded, and what moved. */
export const shiftOf = (page: Page): Promise<{ total: number; shifts: unknown[] }> =>
  page.evaluate('({ total: window.outswellShift, shifts: window.outswellShifts })');
