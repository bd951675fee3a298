// Is there room for what is about to be written?
import { statfsSync } from 'node:fs';
import { Stop } from './say.mjs';

const gigabyte = 1e9;

/** @throws Stop when the folder's disk has less than `needed` bytes free */
export function needRoom(folder, needed) {
  const { bavail, bsize } = statfsSync(folder);
  const free = bavail * bsize;
  if (free >= needed) return `${inGigabytes(free)} free`;
  throw new Stop(
    `The disk of ${folder} has ${inGigabytes(free)} free; ${inGigabytes(needed)} are needed. Free some space, then run the command again.`,
  );
}

const inGigabytes = (bytes) => `${(bytes / gigabyte).toFixed(1)} GB`;

/** Room a first install takes: packages, programs, a database, a build. */
export const roomToInstall = 1.5 * gigabyte;

/** Room a running shop needs to go on for a while. */
export const roomToRun = 0.3 * gigabyte;
