/** A 12 MP camera photo through our checks and encodings, against sharp alone making the same four pictures. */
import sharp from 'sharp';
import { reencode } from '@/server/storage/reencode';
import { verifyPhoto } from '@/server/storage/verify';
import { cameraJpeg } from '../fixtures/pictures';
import { median, row, type BenchRow } from './row';

const timed = async (work: () => Promise<unknown>): Promise<number> => {
  const started = performance.now();
  await work();
  return performance.now() - started;
};

async function ours(file: Buffer): Promise<void> {
  const verdict = await verifyPhoto(file, 'image/jpeg');
  if (!verdict.fit) throw new Error(verdict.why);
  await reencode(file);
}

/** What one would write with sharp's manual at hand: each picture from the file, in turn. */
async function alone(file: Buffer): Promise<void> {
  const within = (side: number) =>
    sharp(file).rotate().resize(side, side, { fit: 'inside', withoutEnlargement: true });
  await within(4000).webp({ quality: 82, effort: 1 }).toBuffer();
  await within(1600).webp({ quality: 80, effort: 2 }).toBuffer();
  await within(400).avif({ quality: 55, effort: 2 }).toBuffer();
  await within(400).webp({ quality: 78, effort: 2 }).toBuffer();
}

export async function rows(): Promise<BenchRow[]> {
  const file = await cameraJpeg(4000, 3000, 6);
  await ours(file);
  const mine: number[] = [];
  const theirs: number[] = [];
  for (let round = 0; round < 5; round++) {
    mine.push(await timed(() => ours(file)));
    theirs.push(await timed(() => alone(file)));
  }
  const note = 'a 12 MP JPEG verified and made into four pictures; sharp alone, without checks';
  return [row('photo', median(mine), median(theirs), note)];
}
