/** A whole product with its built client, and people who use it in Chromium. */
import { mkdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { BrowserContext, Page } from 'playwright-core';
import { signInAt, startProduct, type Product } from '../api/harness';
import { cookieOf } from '../api/uploading';
import { makeProfiles, takePlace } from './profiles';

export interface Screen {
  name: string;
  width: number;
  height: number;
  touch: boolean;
  theme: 'dark' | 'light';
  /** Offers the guide, as to a new person. */
  guide?: boolean;
}
export const PHONE: Screen = { name: 'phone', width: 390, height: 844, touch: true, theme: 'dark' };
export const WIDE: Screen = { name: 'wide', width: 1440, height: 900, touch: false, theme: 'light' };

const SHOTS = join(__dirname, 'screens');
const AXE = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8');

export interface Stage {
  product: Product;
  /** A page of a context that nobody else uses until it is closed. */
  open(screen: Screen, login?: string): Promise<{ page: Page; context: BrowserContext; errors: string[] }>;
  close(): Promise<void>;
}

export async function openStage(env: Record<string, string> = {}): Promise<Stage> {
  const place = await takePlace();
  const product = await startProduct({ PORT: String(place.port), ...env });
  await product.startWorker();
  const profiles = makeProfiles(product.url, place.folder);
  return {
    product,
    async open(screen, login) {
      const context = await profiles.lend(screen.touch);
      const page = await context.newPage();
      await page.setViewportSize({ width: screen.width, height: screen.height });
      await page.emulateMedia({ colorScheme: screen.theme });
      // what is offered to new people stays away, except where it is what is tried
      if (!screen.guide) await page.addInitScript(`localStorage.setItem('outswell.guide.all', 'seen')`);
      const errors: string[] = [];
      page.on('pageerror', (error) => errors.push(String(error)));
      if (login) await context.addCookies([await sessionOf(product.url, login)]);
      return { page, context, errors };
    },
    async close() {
      await profiles.end();
      await product.stop();
      place.leave();
    },
  };
}

/** A session begun without the browser, which takes seconds to walk that way; `signIn` does it for the tests of it. */
async function sessionOf(url: string, login: string) {
  const [name = '', ...value] = cookieOf(await signInAt(url, login), url).split('=');
  return { name, value: value.join('='), url, httpOnly: true };
}

/** The way a person goes: the button, the provider's page, and back. */
export async function signIn(page: Page, login: string): Promise<void> {
  await page.goto('/sign-in');
  await page
    .getByRole('link', { name: /^Sign in/ })
    .or(page.getByRole('button', { name: /^Sign in/ }))
    .first()
    .click();
  await page.waitForURL(/local-sign-in/);
  await page.getByLabel(/login/i).fill(login);
  await page.getByLabel(/login/i).press('Enter');
  await page.waitForURL((url) => !/local-sign-in|auth/.test(url.pathname));
}

/** With SHOTS=1 a picture for a look by eye; no test compares pixels, and each takes half a second. */
export async function shot(page: Page, screen: Screen, name: string): Promise<void> {
  if (!process.env.SHOTS) return;
  mkdirSync(SHOTS, { recursive: true });
  await page.screenshot({ path: join(SHOTS, `${name}-${screen.name}.png`) });
}

interface Violation {
  id: string;
  impact: string;
  nodes: { html: string; failureSummary: string }[];
}

/** Serious and critical findings of axe-core on the page as it stands. */
export async function violations(page: Page): Promise<string[]> {
  await page.evaluate(AXE);
  const found = (await page.evaluate(
    `axe.run(document, { resultTypes: ['violations'] }).then((r) => r.violations)`,
  )) as Violation[];
  return found
    .filter((v) => ['serious', 'critical'].includes(v.impact))
    .flatMap((v) =>
      v.nodes.map((n) => `${v.id}: ${n.html.slice(0, 160)} — ${n.failureSummary.replace(/\s+/g, ' ')}`),
    );
}

/** What the API says to the person of this page. */
export const api = async <T>(page: Page, path: string): Promise<T> =>
  (await (await page.request.get(`/api/v1${path}`)).json()) as T;
