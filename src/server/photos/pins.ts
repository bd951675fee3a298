/** Writing pins: marks on a photo, tied to a part of the board or with a label of their own. */
import { and, count, eq, sql } from 'drizzle-orm';
import type { EditPin, NewPin, PinView } from '@/contracts/photos';
import type { Queryable } from '@/db/client';
import { pins } from '@/db/schema/photos';
import type { Granted } from '../auth/actor';
import { absent, done, refuse, refuseField, type Outcome } from '../refusal';
import { boardOfPhoto, partOfBoard, photoByPublicId, pinById } from './queries';
import { refuseClosed } from './policy';
import type { PhotoRow } from './types';

type Bench = Granted<'ticket.bench'>;

const MOST_PINS = 200;

/** The photo, ready and of a ticket that is not closed. */
async function openPhoto(db: Queryable, publicId: string, now: Date): Promise<Outcome<PhotoRow>> {
  const row = await photoByPublicId(db, publicId);
  if (row?.state !== 'ready') return absent('photo');
  return (await refuseClosed(db, row, now)) ?? done(row);
}

/** What the pin stands for: a part of the photo's board under its reference, or a label alone. */
async function standsFor(
  db: Queryable,
  photo: PhotoRow,
  { partId, label }: { partId?: number | undefined; label?: string | undefined },
): Promise<Outcome<{ partId?: number | null; label?: string }>> {
  if (partId === undefined) return done(label === undefined ? {} : { partId: null, label });
  const ref = await partOfBoard(db, await boardOfPhoto(db, photo), partId);
  return ref === null
    ? refuseField('partId', `${partId} is no part of this board: choose one of its parts.`)
    : done({ partId, label: ref });
}

/** Puts a pin on a ready photo. */
export async function addPin(
  db: Queryable,
  actor: Bench,
  { photo: publicId, ...input }: NewPin & { photo: string },
  now: Date,
): Promise<Outcome<PinView>> {
  const open = await openPhoto(db, publicId, now);
  if (!open.ok) return open;
  const photo = open.value;
  const what = await standsFor(db, photo, input);
  if (!what.ok) return what;
  const [held] = await db.select({ n: count() }).from(pins).where(eq(pins.photoId, photo.id));
  if ((held?.n ?? 0) >= MOST_PINS)
    return refuse('conflict', `The photo has ${MOST_PINS} pins: take some off first.`);
  const pin = { x: input.x, y: input.y, partId: null, label: '', ...what.value };
  const [made] = await db
    .insert(pins)
    .values({ ...pin, photoId: photo.id, createdBy: actor.id, createdAt: now })
    .$returningId();
  if (!made) throw new Error('The pin was not written.');
  return done({ ...pin, id: made.id, version: 1 });
}

type PinPlace = { photo: string; pin: number; version: number };

async function stalePin(db: Queryable, photo: PhotoRow, { pin, version }: PinPlace) {
  const current = await pinById(db, photo.id, pin);
  if (!current) return absent('pin');
  return refuse(
    'stale',
    `Version ${version} was given, the pin is at ${current.version}: look again.`,
    {
      more: { given: version, current },
    },
  );
}

/** Moves a pin or gives it another part or label. */
export async function editPin(
  db: Queryable,
  _actor: Bench,
  input: EditPin & PinPlace,
  now: Date,
): Promise<Outcome<PinView>> {
  const open = await openPhoto(db, input.photo, now);
  if (!open.ok) return open;
  const photo = open.value;
  const what = await standsFor(db, photo, input);
  if (!what.ok) return what;
  const [result] = await db
    .update(pins)
    .set({ x: input.x, y: input.y, ...what.value, version: sql`${pins.version} + 1` })
    .where(
      and(eq(pins.id, input.pin), eq(pins.photoId, photo.id), eq(pins.version, input.version)),
    );
  if (result.affectedRows !== 1) return stalePin(db, photo, input);
  const pin = await pinById(db, photo.id, input.pin);
  return pin ? done(pin) : absent('pin');
}

/** Takes a pin off. */
export async function removePin(
  db: Queryable,
  _actor: Bench,
  input: PinPlace,
  now: Date,
): Promise<Outcome<null>> {
  const open = await openPhoto(db, input.photo, now);
  if (!open.ok) return open;
  const photo = open.value;
  const [result] = await db
    .delete(pins)
    .where(
      and(eq(pins.id, input.pin), eq(pins.photoId, photo.id), eq(pins.version, input.version)),
    );
  return result.affectedRows === 1 ? done(null) : stalePin(db, photo, input);
}
