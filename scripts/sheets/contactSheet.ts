import { readFileSync } from 'node:fs';
import type { Browser } from 'playwright-core';

export interface Shot {
  title: string;
  path: string;
  /** Of the window, CSS pixels. */
  width: number;
  height: number;
}

/** Height of a row of pictures on the sheet. */
const ROW_PX = 620;

/** One picture of many: rows of screenshots with their names. */
export async function contactSheet(
  browser: Browser,
  title: string,
  rows: readonly (readonly Shot[])[],
  target: string,
): Promise<void> {
  const picture = ({ title: name, path, width, height }: Shot) =>
    `<figure><img style="height:${ROW_PX}px;width:${(ROW_PX * width) / height}px" ` +
    `src="data:image/jpeg;base64,${readFileSync(path).toString('base64')}"><figcaption>${name}</figcaption></figure>`;
  const page = await browser.newPage({ viewport: { width: 3600, height: 800 } });
  await page.setContent(
    `<style>body{margin:16px;background:#888;font:22px sans-serif;width:max-content}
      div{display:flex;gap:16px;align-items:flex-start}figure{margin:0 0 12px}</style>
      <h1>${title}</h1>${rows.map((row) => `<div>${row.map(picture).join('')}</div>`).join('')}`,
  );
  await page.screenshot({ path: target, fullPage: true, type: 'jpeg', quality: 82 });
  await page.close();
}
