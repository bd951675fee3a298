/** The staff as lists: a page for the API, a file for the owner. */
import type { PeopleQuery, Person } from '@/contracts/people';
import type { Queryable } from '@/db/client';
import { everyRow, pageOf, readCursor } from '../http/cursor';
import { csvResponse, type CsvColumn } from '../http/csv';
import { done, type Outcome } from '../refusal';
import { heldBy, listPeople, placeOfPerson } from './queries';

export async function peoplePage(
  db: Queryable,
  query: PeopleQuery,
): Promise<Outcome<{ items: Person[]; next: string | null }>> {
  const { sort, limit } = query;
  const after = readCursor(sort, query.cursor, heldBy(sort));
  if (!after.ok) return after;
  const rows = await listPeople(db, query, { limit: limit + 1, after: after.value });
  return done(pageOf(rows, limit, sort, (person) => placeOfPerson(sort, person)));
}

const COLUMNS: readonly CsvColumn<Person>[] = [
  { name: 'name', value: (person) => person.name },
  { name: 'email', value: (person) => person.email },
  { name: 'role', value: (person) => person.role },
  { name: 'state', value: (person) => person.state },
  { name: 'second factor', value: (person) => person.secondFactor },
  { name: 'since', value: (person) => person.since },
];

export const peopleFile = (request: Request, db: Queryable, query: PeopleQuery): Response =>
  csvResponse(
    request,
    'people',
    COLUMNS,
    everyRow(
      (limit, after) => listPeople(db, query, { limit, after }),
      (person) => placeOfPerson(query.sort, person),
    ),
  );
