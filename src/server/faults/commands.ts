/** Writing notes: drafts, revisions, steps. The version in each UPDATE is the guard. */
import { and, eq, inArray, sql } from 'drizzle-orm';
import type { FaultDetail, FaultInput, NewFault, TakeFaultStep } from '@/contracts/faults';
import { inTransaction, type Database, type Queryable } from '@/db/client';
import { faultNotes, faultRevisions, faultSteps, revisions } from '@/db/schema/faults';
import { photos } from '@/db/schema/photos';
import { boards } from '@/db/schema/shop';
import { ticketEvents, tickets } from '@/db/schema/tickets';
import { photosIn, SECTIONS, sectionWords, type FaultBody } from '@/domain/faults/body';
import { missingIn } from '@/domain/faults/complete';
import { decideFaultStep, type FaultState } from '@/domain/faults/states';
import type { Granted, StaffActor } from '../auth/actor';
import { absent, done, refuse, refuseField, type Outcome, type Refusal } from '../refusal';
import { mayEdit, mayRead, standingOf } from './policy';
import { readFault } from './queries';
import type { FaultInput as Input } from './types';

type Author = Granted<'fault.draft'>;

const wordsOf = (note: Input) =>
  [note.title, ...SECTIONS.map((s) => sectionWords(note.body[s]))].join('\n');

/** The columns of the note's row that follow the revision its readers see. */
const shownFacts = (note: Input) => ({
  title: note.title,
  boardId: note.boardId,
  partKind: note.partKind,
  incident: note.incident,
  symptoms: note.symptoms,
  words: wordsOf(note),
});

/** Moves the counter every process looks at; call it in the transaction that changes what is published. */
export async function markPublishedSetChanged(tx: Queryable): Promise<void> {
  await tx
    .update(revisions)
    .set({ value: sql`${revisions.value} + 1` })
    .where(eq(revisions.name, 'faults'));
}

/** What the text points at must exist: the board, the photos. */
async function checkPointers(tx: Queryable, input: Input): Promise<Refusal | null> {
  if (input.boardId !== null) {
    const [board] = await tx
      .select({ id: boards.id })
      .from(boards)
      .where(eq(boards.id, input.boardId));
    if (!board) return refuseField('boardId', 'There is no such board: choose one of the list.');
  }
  const shown = photosIn(input.body);
  if (shown.length === 0) return null;
  const known = await tx
    .select({ id: photos.publicId })
    .from(photos)
    .where(
      and(
        inArray(photos.publicId, [...new Set(shown.map((p) => p.id))]),
        eq(photos.state, 'ready'),
      ),
    )
    // A photo that is just being removed is waited for, and one that stands stays until this is written.
    .for('update');
  const missing = shown.find((p) => !known.some((k) => k.id === p.id));
  return missing
    ? refuseField(`body.${missing.section}`, 'A photo in it is not there any more: take it out.')
    : null;
}

async function writeRevision(
  tx: Queryable,
  noteId: number,
  revision: number,
  { title, boardId, partKind, incident, symptoms, body }: Input,
  authorId: number,
  at: Date,
): Promise<void> {
  const facts = { title, boardId, partKind, incident, symptoms };
  await tx.insert(faultRevisions).values({ noteId, revision, ...facts, body, authorId, at });
}

/** Starts a note as a draft; when it comes from a ticket, the ticket says so in its events. */
export async function draftFault(
  db: Database,
  actor: Author,
  { ticket: number, ...input }: NewFault,
  now: Date,
): Promise<Outcome<FaultDetail>> {
  return inTransaction(db, async (tx) => {
    const wrong = await checkPointers(tx, input);
    if (wrong) return wrong;
    const [ticket] = number
      ? await tx.select({ id: tickets.id }).from(tickets).where(eq(tickets.number, number))
      : [];
    if (number && !ticket) return refuseField('ticket', `There is no ticket ${number}.`);
    const [made] = await tx
      .insert(faultNotes)
      .values({
        ...shownFacts(input),
        state: 'draft',
        revision: 1,
        fromTicketId: ticket?.id ?? null,
        createdBy: actor.id,
        createdAt: now,
        updatedAt: now,
      })
      .$returningId();
    if (!made) throw new Error('The database gave no id for the new fault note');
    await writeRevision(tx, made.id, 1, input, actor.id, now);
    if (ticket)
      await tx.insert(ticketEvents).values({
        ticketId: ticket.id,
        at: now,
        actorId: actor.id,
        actorName: actor.name,
        kind: 'fault',
        note: `Fault note ${made.id} drafted: ${input.title}`,
        open: false,
      });
    return done(await reread(tx, actor, made.id));
  });
}

async function reread(tx: Queryable, actor: StaffActor, id: number): Promise<FaultDetail> {
  const note = await readFault(tx, actor, id, 'newest');
  if (!note) throw new Error(`Fault note ${id} is gone right after it was written`);
  return note;
}

/** Takes the note's row for writing. */
async function lockNote(tx: Queryable, actor: StaffActor, id: number) {
  const [note] = await tx.select().from(faultNotes).where(eq(faultNotes.id, id)).for('update');
  return note && mayRead(actor, note) ? note : null;
}

/** A newer version stands: both are answered, so that nothing typed is lost. */
const stale = (current: FaultDetail, given: unknown) =>
  refuse('stale', 'The note was changed meanwhile: both versions are here, yours is not saved.', {
    more: { current, given },
  });

/** Saves a note as a new revision. A published one keeps showing its readers the revision they have. */
export async function saveFault(
  db: Database,
  actor: Author,
  id: number,
  version: number,
  input: FaultInput,
  now: Date,
): Promise<Outcome<FaultDetail>> {
  return inTransaction(db, async (tx) => {
    const note = await lockNote(tx, actor, id);
    if (!note) return absent('fault note');
    if (!mayEdit(actor, note))
      return refuse('not-allowed', `A note that is ${note.state} is edited by a senior.`);
    if (note.version !== version) return stale(await reread(tx, actor, id), input);
    const wrong = await checkPointers(tx, input);
    if (wrong) return wrong;
    const revision = note.revision + 1;
    const [changed] = await tx
      .update(faultNotes)
      .set({
        ...(note.state === 'published' ? {} : { ...shownFacts(input), updatedAt: now }),
        revision,
        version: version + 1,
      })
      .where(and(eq(faultNotes.id, id), eq(faultNotes.version, version)));
    if (changed.affectedRows !== 1) return stale(await reread(tx, actor, id), input);
    await writeRevision(tx, id, revision, input, actor.id, now);
    return done(await reread(tx, actor, id));
  });
}

async function revisionInput(tx: Queryable, id: number, revision: number): Promise<Input> {
  const [row] = await tx
    .select()
    .from(faultRevisions)
    .where(and(eq(faultRevisions.noteId, id), eq(faultRevisions.revision, revision)));
  if (!row) throw new Error(`Fault note ${id} has no revision ${revision}`);
  const { title, boardId, partKind, incident, symptoms, body } = row;
  return { title, boardId, partKind, incident, symptoms, body: body satisfies FaultBody };
}

const REFUSED = {
  'not-allowed': 'not-allowed',
  'not-from-here': 'conflict',
  missing: 'conflict',
} as const;

/** Moves a note one step: the machine decides, the version guards, the index of every process hears of it. */
export async function takeFaultStep(
  db: Database,
  actor: Author,
  id: number,
  version: number,
  { step, note: words }: TakeFaultStep,
  now: Date,
): Promise<Outcome<{ state: FaultState; version: number }>> {
  return inTransaction(db, async (tx) => {
    const note = await lockNote(tx, actor, id);
    if (!note) return absent('fault note');
    const decided = decideFaultStep(standingOf(actor, note), actor.role, step, words);
    if (!decided.ok)
      return decided.path
        ? refuseField(decided.path, decided.reason)
        : refuse(REFUSED[decided.why], decided.reason);
    if (note.version !== version)
      return refuse('stale', 'The note was changed meanwhile: read it again, then take the step.', {
        more: { current: await reread(tx, actor, id), given: { step, note: words } },
      });
    // To give a correction up is to save the published text again, on top of it.
    const revision = step === 'drop' ? note.revision + 1 : note.revision;
    const from = step === 'drop' ? (note.publishedRevision ?? note.revision) : revision;
    const text = await revisionInput(tx, id, from);
    const missing = decided.complete ? missingIn(text) : [];
    if (missing.length > 0)
      return refuse('invalid', 'The note is not finished: some parts are missing.', {
        errors: missing,
      });
    if (step === 'drop') await writeRevision(tx, id, revision, text, actor.id, now);
    const publishes = decided.to === 'published';
    const [changed] = await tx
      .update(faultNotes)
      .set({
        ...shownFacts(text),
        state: decided.to,
        revision,
        version: version + 1,
        ...(publishes ? { publishedRevision: revision } : {}),
        // Dropping a correction gives readers nothing new.
        ...(step === 'drop' ? {} : { updatedAt: now }),
        ...(step === 'publish' ? { publishedBy: actor.id, publishedAt: now } : {}),
      })
      .where(and(eq(faultNotes.id, id), eq(faultNotes.version, version)));
    if (changed.affectedRows !== 1) return refuse('stale', 'The note was changed meanwhile.');
    await tx.insert(faultSteps).values({
      noteId: id,
      at: now,
      actorId: actor.id,
      actorName: actor.name,
      fromState: note.state,
      toState: decided.to,
      revision,
      note: words,
    });
    if (publishes || note.state === 'published') await markPublishedSetChanged(tx);
    return done({ state: decided.to, version: version + 1 });
  });
}
