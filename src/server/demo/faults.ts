/** The demo shop's fault notes: written, sent to review, published and corrected with the shop's own commands. */
import { readFileSync, readdirSync } from 'node:fs';
import { inArray } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { users } from '@/db/schema/people';
import { FaultInput } from '@/contracts/faults';
import type { FaultBody } from '@/domain/faults/body';
import type { FaultState, FaultStep } from '@/domain/faults/states';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import type { Symptom } from '@/domain/tickets/vocabulary';
import { grant, type Granted } from '../auth/actor';
import { draftFault, saveFault, takeFaultStep } from '../faults/commands';

export type DemoFault = {
  key: string;
  state: FaultState;
  author: string;
  daysAgo: number;
  title: string;
  /** The board's code, `LB-40`, or null for a note on a part family alone. */
  board: string | null;
  partKind: PartKind | null;
  incident: Incident | null;
  symptoms: Symptom[];
  body: FaultBody;
  /** What it said before it said this. */
  earlier?: { title: string; body: FaultBody }[];
  /** Why it was retired. */
  reason?: string;
};

export type DemoFaultKeys = {
  userIdsByEmail: ReadonlyMap<string, number>;
  boardIdByCode: ReadonlyMap<string, number>;
  now: Date;
};

const FOLDER = 'content/demo/faults';
const SENIOR = 'senior@meterwright.example';
const DAY = 86_400_000;
const HOUR = 3_600_000;

/** The notes as they lie in content/demo/faults. */
export const demoFaults = (): DemoFault[] =>
  readdirSync(FOLDER)
    .filter((name) => name.endsWith('.json'))
    .sort()
    .map((name) => JSON.parse(readFileSync(`${FOLDER}/${name}`, 'utf8')) as DemoFault)
    .sort((a, b) => b.daysAgo - a.daysAgo);

type Author = Granted<'fault.draft'>;

async function authors(db: Database, ids: ReadonlyMap<string, number>) {
  const rows = await db
    .select()
    .from(users)
    .where(inArray(users.id, [...ids.values()]));
  const byEmail = new Map<string, Author>();
  for (const { id, name, email, role } of rows) {
    if (role === 'customer') continue;
    const actor = grant({ kind: 'staff', id, name, email, role, scopes: null }, 'fault.draft');
    if (actor) byEmail.set(email, actor);
  }
  return (email: string): Author => {
    const found = byEmail.get(email);
    if (!found) throw new Error(`No demo account ${email} that writes fault notes.`);
    return found;
  };
}

const STEPS: Record<FaultState, FaultStep[]> = {
  draft: [],
  'in-review': ['submit'],
  published: ['submit', 'publish'],
  retired: ['submit', 'publish', 'retire'],
};

async function writeNote(
  db: Database,
  note: DemoFault,
  boardId: number | null,
  author: Author,
  senior: Author,
  now: Date,
): Promise<void> {
  const { key, partKind, incident, symptoms } = note;
  const texts = [...(note.earlier ?? []), { title: note.title, body: note.body }];
  const [first, ...later] = texts.map((text) =>
    FaultInput.parse({ boardId, partKind, incident, symptoms, ...text }),
  );
  if (!first) throw new Error(`The demo note ${key} has no text.`);
  let at = now.getTime() - note.daysAgo * DAY;
  const tick = (hours: number) => {
    at = Math.min(at + hours * HOUR, now.getTime());
    return new Date(at);
  };
  const made = await draftFault(db, author, { ...first, ticket: null }, tick(0));
  if (!made.ok) throw new Error(`The demo note ${key} was refused: ${made.reason}`);
  const { id } = made.value;
  let { version } = made.value;
  const walk = async (steps: FaultStep[]) => {
    for (const step of steps) {
      const who = step === 'submit' ? author : senior;
      const words = step === 'retire' ? (note.reason ?? '') : '';
      const moved = await takeFaultStep(db, who, id, version, { step, note: words }, tick(5));
      if (!moved.ok) throw new Error(`The demo note ${key} stays behind: ${moved.reason}`);
      version = moved.value.version;
    }
  };
  await walk(STEPS[note.state]);
  for (const text of later) {
    const saved = await saveFault(db, senior, id, version, text, tick(40 * 24));
    if (!saved.ok) throw new Error(`The demo note ${key} was not corrected: ${saved.reason}`);
    version = saved.value.version;
    await walk(['publish']);
  }
}

/** Writes the notes into a shop whose people and boards are there. */
export async function seedFaults(db: Database, keys: DemoFaultKeys): Promise<void> {
  const author = await authors(db, keys.userIdsByEmail);
  for (const note of demoFaults()) {
    const boardId = note.board === null ? null : (keys.boardIdByCode.get(note.board) ?? null);
    if (note.board !== null && boardId === null)
      throw new Error(`The demo note ${note.key} stands on a board that is not there.`);
    await writeNote(db, note, boardId, author(note.author), author(SENIOR), keys.now);
  }
}
