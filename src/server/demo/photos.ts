/** The demo shop's photos: drawn boards, taken in the way every photo goes. */
import { photos } from '@/db/schema/photos';
import { boardParts } from '@/db/schema/shop';
import type { PhotoSide } from '@/domain/photos/files';
import type { StaffRole } from '@/domain/people';
import { grant, type Granted } from '../auth/actor';
import { newPublicId } from '../auth/secrets';
import { beginPhoto, editPhoto } from '../photos/commands';
import { finishPhoto } from '../photos/finish';
import { UPLOADS } from '../photos/objects';
import { addPin } from '../photos/pins';
import { photoByPublicId } from '../photos/queries';
import type { PhotoShop } from '../photos/types';
import type { Outcome } from '../refusal';
import { turns } from '../storage/turns';
import type { Wear } from './board-drawing/bodies/brush';
import type { Point } from './board-drawing/geometry';
import { photographed } from './board-drawing/photograph';
import { demoScenarios, type DemoBoard } from './content';
import { photoStories, type Picture, type Story } from './photo-story';

type Bench = Granted<'ticket.bench'>;
type PhotoSeed = {
  uploader: { id: number; name: string; email: string; role: StaffRole };
  boards: readonly DemoBoard[];
  boardIds: ReadonlyMap<string, number>;
};
type Work = { shop: PhotoShop; actor: Bench; partIds: ReadonlyMap<string, number>; now: Date };

const TICKETS = 10;
const WHOLE = { width: 2400, height: 1600 };
/** Of tickets: smaller, as phones send them over a poor line. */
const SMALL = { width: 1260, height: 840 };
const CLOSE_SPAN = 58;
const TYPE = 'image/jpeg';

function must<T>(outcome: Outcome<T>, what: string): T {
  if (!outcome.ok) throw new Error(`Demo photos, ${what}: ${outcome.reason}`);
  return outcome.value;
}

/** Puts the file where its waiting row says, and makes the photo ready. */
async function deliver({ shop }: Work, publicId: string, jpeg: Buffer, at: Date): Promise<void> {
  const row = await photoByPublicId(shop.db, publicId);
  if (!row?.uploadKey) throw new Error(`Demo photos: ${publicId} does not wait for a file.`);
  await shop.store.put(row.uploadKey, jpeg, TYPE);
  must(await finishPhoto(shop, row.id, at), row.fileName);
}

async function pin(
  work: Work,
  photo: string,
  board: DemoBoard,
  places: ReadonlyMap<string, Point>,
  at: Date,
) {
  for (const [ref, { x, y }] of places) {
    const partId = work.partIds.get(`${board.code} ${ref}`);
    if (partId === undefined) continue;
    must(await addPin(work.shop.db, work.actor, { photo, x, y, partId }, at), `pin ${ref}`);
  }
}

/** One side of a board for its board file, with a pin on every part that is seen. */
async function boardPhoto(work: Work, board: DemoBoard, boardId: number, side: 'front' | 'back') {
  const { shop, actor, now } = work;
  const seed = 11 + boardId;
  const { jpeg, places } = await photographed({ board, side, wear: new Map(), ...WHOLE, seed });
  const publicId = newPublicId();
  await shop.db.insert(photos).values({
    publicId,
    boardId,
    uploaderId: actor.id,
    state: 'waiting',
    uploadKey: `${UPLOADS}${publicId}`,
    fileName: `${board.code}-${side}.jpg`,
    declaredType: TYPE,
    declaredBytes: jpeg.length,
    side,
    phase: 'before',
    caption: `${board.maker} ${board.code} revision ${board.revision}, ${side}`,
    createdAt: now,
  });
  await deliver(work, publicId, jpeg, now);
  await pin(work, publicId, board, places, now);
}

/** What is in front of the camera: after the repair the parts that failed are new ones. */
const wearIn = ({ wear }: Story, { phase }: Picture): ReadonlyMap<string, Wear> =>
  phase === 'before' ? wear : new Map([...wear.keys()].map((ref) => [ref, 'fresh' as const]));

const sideOf = (board: DemoBoard, ref: string): PhotoSide & ('front' | 'back') => {
  const part = board.parts.find((p) => p.ref === ref);
  return part?.kind === 'contact' && !part.value.includes('relay') ? 'back' : 'front';
};

async function ticketPhoto(work: Work, story: Story, picture: Picture, place: number) {
  const { shop, actor } = work;
  const { number, board, wear } = story;
  const refs = [...wear.keys()];
  const { phase, close, caption, shared, at } = picture;
  const side = sideOf(board, close[0] ?? refs[0] ?? '');
  const { jpeg, places } = await photographed({
    board,
    side,
    wear: wearIn(story, picture),
    ...SMALL,
    close: close.length > 0 ? { refs: close, span: CLOSE_SPAN } : undefined,
    seed: Number(number.replace(/\D/g, '')) * 3 + place,
  });
  const fileName = `${number}-${phase}-${place + 1}.jpg`;
  const claim = { number, fileName, type: TYPE, bytes: jpeg.length, side, phase };
  const { photo } = must(await beginPhoto(shop, actor, claim, at), fileName);
  await deliver(work, photo, jpeg, at);
  const seen = [...places].filter(([ref]) => refs.includes(ref));
  await pin(work, photo, board, new Map(seen), at);
  const edit = { id: photo, version: 1, caption, ...(shared ? { shared } : {}) };
  must(await editPhoto(shop, actor, edit, at), fileName);
}

/**
 * Writes the photos of the board files (both sides, pinned) and of about ten tickets (as found, close up, repaired)
 * into a shop whose boards and tickets are there.
 */
export async function seedPhotos(
  shop: PhotoShop,
  { uploader, boards, boardIds }: PhotoSeed,
  now: Date,
): Promise<void> {
  const actor = grant({ kind: 'staff', ...uploader, scopes: null }, 'ticket.bench');
  if (!actor) throw new Error(`${uploader.name} may not take photos.`);
  const codes = new Map([...boardIds].map(([code, id]) => [id, code]));
  const rows = await shop.db
    .select({ id: boardParts.id, ref: boardParts.ref, boardId: boardParts.boardId })
    .from(boardParts);
  const partIds = new Map(rows.map((p) => [`${codes.get(p.boardId) ?? ''} ${p.ref}`, p.id]));
  const work: Work = { shop, actor, partIds, now };
  const jobs: (() => Promise<void>)[] = boards.map((board) => async () => {
    const boardId = boardIds.get(board.code);
    if (boardId === undefined) throw new Error(`Demo photos: no board ${board.code}.`);
    await boardPhoto(work, board, boardId, 'front');
    await boardPhoto(work, board, boardId, 'back');
  });
  for (const story of await photoStories(shop.db, boards, demoScenarios(), TICKETS))
    jobs.push(async () => {
      for (const [place, picture] of story.pictures.entries())
        await ticketPhoto(work, story, picture, place);
    });
  // One is drawn while another is encoded.
  const inTurn = turns(2);
  await Promise.all(jobs.map((job) => inTurn(job)));
}
