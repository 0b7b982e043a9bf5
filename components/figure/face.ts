import { fonts } from '@/components/ui/tokens';

/** As the file names it: a program that has the face installed finds it. */
export const FAMILY = 'Atkinson Hyperlegible Next';

let known: Promise<string> | null = null;

/** A style rule with the product's text face in it, from what the page has loaded; empty where there is none. */
export const faceCss = (): Promise<string> => (known ??= readFace().catch(() => ''));

async function readFace(): Promise<string> {
  const address = addressOf(fonts.regular);
  if (!address) return '';
  const bytes = new Uint8Array(await (await fetch(address)).arrayBuffer());
  return `@font-face{font-family:'${FAMILY}';src:url(data:font/ttf;base64,${base64(bytes)})}`;
}

function addressOf(family: string): string | null {
  for (const sheet of Array.from(document.styleSheets))
    for (const rule of Array.from(sheet.cssRules))
      if (rule instanceof CSSFontFaceRule && rule.style.getPropertyValue('font-family').includes(family)) {
        const found = /url\(["']?([^"')]+)/.exec(rule.style.getPropertyValue('src'));
        // not "OutswellTextBold" for "OutswellText"
        if (found && rule.style.getPropertyValue('font-family').replace(/["']/g, '') === family)
          return new URL(found[1]!, sheet.href ?? document.baseURI).href;
      }
  return null;
}

function base64(bytes: Uint8Array): string {
  let text = '';
  for (let i = 0; i < bytes.length; i += 8192) text += String.fromCharCode(...bytes.subarray(i, i + 8192));
  return btoa(text);
}
