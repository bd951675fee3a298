// Where things are: the checkout, and the folder that holds what a run leaves behind.
import { mkdirSync } from 'node:fs';
import { resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout's top folder. */
export const root = fileURLToPath(new URL('../../..', import.meta.url)).replace(/\/$/, '');

/** Builds and other things that belong to the checkout, whichever data folder is in use. */
export const cacheFolder = `${root}/.data`;

/** The data folder of `npm start`: `METERWRIGHT_DATA`, or `.data` in the checkout. Made if missing. */
export function dataFolder() {
  const folder = process.env.METERWRIGHT_DATA
    ? resolve(process.env.METERWRIGHT_DATA)
    : `${root}/.data`;
  mkdirSync(`${folder}/logs`, { recursive: true });
  return folder;
}
