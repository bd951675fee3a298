import { describe, expect, test } from 'vitest';
import { FaultInput } from '@/contracts/faults';
import { partRefs, SECTIONS } from '@/domain/faults/body';
import { missingIn } from '@/domain/faults/complete';
import { resistanceBetween } from '@/domain/network/resistance';
import type { Network } from '@/domain/network/types';
import { parseResistance } from '@/domain/quantities/parse';
import { demoBoards } from '@/server/demo/content';
import { demoFaults } from '@/server/demo/faults';

const boards = new Map(demoBoards().map((b) => [b.code, b]));
const notes = demoFaults();

test('25 notes: 20 published, 2 in review, 2 drafts, 1 retired', () => {
  const count = (state: string) => notes.filter((n) => n.state === state).length;
  expect(['published', 'in-review', 'draft', 'retired'].map(count)).toEqual([20, 2, 2, 1]);
});

describe.each(notes.map((n) => [n.key, n] as const))('%s', (_key, note) => {
  const { title, partKind, incident, symptoms, body } = note;
  const boardId = note.board === null ? null : 1;

  test('is a valid note, whole unless it is a draft', () => {
    const parsed = FaultInput.safeParse({ title, boardId, partKind, incident, symptoms, body });
    expect(parsed.error?.issues ?? []).toEqual([]);
    if (note.state !== 'draft') expect(missingIn({ title, boardId, partKind, body })).toEqual([]);
  });

  test('names parts that its board has', () => {
    const board = note.board === null ? undefined : boards.get(note.board);
    if (note.board !== null) expect(board).toBeDefined();
    const known = new Set(board?.parts.map((p) => p.ref));
    expect(board ? partRefs(body).filter((ref) => !known.has(ref)) : []).toEqual([]);
  });

  // What a note says a healthy board would show is what the board's own network gives, within 2 %.
  test('expects of its readings what the healthy network shows', () => {
    const board = note.board === null ? undefined : boards.get(note.board);
    if (!board) return;
    const network: Network = {
      positions: board.positions,
      parts: board.parts.flatMap(({ nets, ohms, tolerance, ...p }) =>
        nets ? [{ ...p, nets, ohms: ohms ?? undefined, tolerance: tolerance ?? undefined }] : [],
      ),
    };
    const readings = SECTIONS.flatMap((s) => body[s]).flatMap((b) =>
      b.type === 'reading' && board.positions.includes(b.attrs.position) ? [b.attrs] : [],
    );
    for (const { from, to, position, expected } of readings) {
      const said = parseResistance(expected ?? '');
      if (!said.ok || to === '') continue;
      const ohms = resistanceBetween(network, { from, to, position });
      const where = `${from}–${to} at ${position}`;
      if (said.kind === 'over-range') expect(ohms, where).toSatisfy((v) => v === 'OL' || v > 60e6);
      else expect(Math.abs(Math.log(Number(ohms) / said.ohms)), where).toBeLessThan(0.021);
    }
  });
});
