import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';

const { resolve } = createRequire(import.meta.url);

const font = (family: 'sans' | 'mono', weight: 400 | 600) => ({
  type: 'font/woff2',
  file: resolve(
    `@fontsource/ibm-plex-${family}/files/ibm-plex-${family}-latin-${weight}-normal.woff2`,
  ),
});

/** Files the inbox serves beside its pages, by path. */
const assets: Record<string, { type: string; file: string | URL }> = {
  '/inbox.css': {
    type: 'text/css; charset=utf-8',
    file: new URL('./inbox.css', import.meta.url),
  },
  '/fonts/sans-400.woff2': font('sans', 400),
  '/fonts/sans-600.woff2': font('sans', 600),
  '/fonts/mono-400.woff2': font('mono', 400),
  '/fonts/mono-600.woff2': font('mono', 600),
};

/** The style sheet or a font, or undefined when the path is neither. */
export async function readAsset(path: string): Promise<{ type: string; body: Buffer } | undefined> {
  const asset = Object.hasOwn(assets, path) ? assets[path] : undefined;
  return asset && { type: asset.type, body: await readFile(asset.file) };
}
