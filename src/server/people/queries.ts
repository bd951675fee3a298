/** Reading the staff: the list, one person. */
import {
  and,
  asc,
  count,
  desc,
  eq,
  inArray,
  isNotNull,
  isNull,
  like,
  ne,
  or,
  sql,
  type SQL,
} from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import type { PeopleQuery, Person } from '@/contracts/people';
import type { StaffRole } from '@/domain/people';
import { containing } from '../customers/queries';
import { afterPlace, type Place } from '../http/cursor';

const columns = {
  id: users.id,
  name: users.name,
  email: users.email,
  role: users.role,
  disabledAt: users.disabledAt,
  createdAt: users.createdAt,
  version: users.version,
  joined: sql`(${users.passwordHash} IS NOT NULL)`.mapWith(Boolean),
  secondFactor: sql`(${users.totpSecret} IS NOT NULL)`.mapWith(Boolean),
};
const staff = ne(users.role, 'customer');

const SORTED = { name: users.name, email: users.email, since: users.createdAt } as const;
type Sorted = keyof typeof SORTED;
const orderOf = (sort: PeopleQuery['sort']) => ({
  by: sort.replace('-', '') as Sorted,
  descending: sort.startsWith('-'),
});

const STATES: Record<Person['state'], SQL | undefined> = {
  disabled: isNotNull(users.disabledAt),
  invited: and(isNull(users.disabledAt), isNull(users.passwordHash)),
  active: and(isNull(users.disabledAt), isNotNull(users.passwordHash)),
};

type Filter = Pick<PeopleQuery, 'q' | 'role' | 'state'>;
function matching({ q, role, state }: Filter): SQL | undefined {
  const pattern = containing(q);
  return and(
    staff,
    q ? or(like(users.name, pattern), like(users.email, pattern)) : undefined,
    role ? eq(users.role, role) : undefined,
    state ? STATES[state] : undefined,
  );
}

const rowsOf = (db: Queryable) => db.select(columns).from(users);
type Row = Awaited<ReturnType<typeof rowsOf>>[number];

const personOf = (row: Row): Person => ({
  id: row.id,
  name: row.name,
  email: row.email,
  role: row.role as StaffRole,
  state: row.disabledAt ? 'disabled' : row.joined ? 'active' : 'invited',
  secondFactor: row.secondFactor,
  since: row.createdAt.toISOString(),
  version: row.version,
});

/** What the column holds that the list is in order of. */
export const heldBy = (sort: PeopleQuery['sort']) => SORTED[orderOf(sort).by].dataType;

/** A person's place in the order of the list. */
export function placeOfPerson(sort: PeopleQuery['sort'], person: Person): Place {
  const { by } = orderOf(sort);
  return { id: person.id, value: by === 'since' ? new Date(person.since) : person[by] };
}

/** The staff that match, in order: from a place on, or from a number of rows on. */
export async function listPeople(
  db: Queryable,
  query: Filter & Pick<PeopleQuery, 'sort'>,
  part: { limit: number; after?: Place | undefined; offset?: number },
): Promise<Person[]> {
  const { by, descending } = orderOf(query.sort);
  const column = SORTED[by];
  const way = descending ? desc : asc;
  const after = part.after && afterPlace(column, users.id, part.after, descending);
  const rows = await rowsOf(db)
    .where(and(matching(query), after))
    .orderBy(way(column), way(users.id))
    .limit(part.limit)
    .offset(part.offset ?? 0);
  return rows.map(personOf);
}

export async function countPeople(db: Queryable, query: Filter): Promise<number> {
  const [row] = await db.select({ n: count() }).from(users).where(matching(query));
  return row?.n ?? 0;
}

/** One member of staff, or null. */
export async function readPerson(db: Queryable, id: number): Promise<Person | null> {
  const [row] = await db
    .select(columns)
    .from(users)
    .where(and(eq(users.id, id), staff));
  return row ? personOf(row) : null;
}

/** The names of some members of staff, by key. */
export async function namesOfPeople(
  db: Queryable,
  ids: readonly number[],
): Promise<Map<number, string>> {
  if (ids.length === 0) return new Map();
  const rows = await db
    .select({ id: users.id, name: users.name })
    .from(users)
    .where(and(inArray(users.id, [...ids]), staff));
  return new Map(rows.map(({ id, name }) => [id, name]));
}
