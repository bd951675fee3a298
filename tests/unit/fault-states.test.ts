import { expect, test } from 'vitest';
import {
  FAULT_STATES,
  FAULT_STEPS,
  decideFaultStep,
  offeredFaultSteps,
  type FaultState,
  type FaultStep,
} from '@/domain/faults/states';
import { ROLES, type Role } from '@/domain/people';

const standing = (state: FaultState, more: { own?: boolean; correction?: boolean } = {}) => ({
  state,
  own: more.own ?? false,
  correction: more.correction ?? false,
});
const decide = (state: FaultState, role: Role, step: FaultStep, more = {}, note = 'because') =>
  decideFaultStep(standing(state, more), role, step, note);

// The table of the design: who may take which step from where, a correction waiting or not.
test.each<[FaultStep, Role[], FaultState[], FaultState]>([
  ['submit', ['technician', 'senior', 'owner'], ['draft'], 'in-review'],
  ['send-back', ['senior', 'owner'], ['in-review'], 'draft'],
  ['publish', ['senior', 'owner'], ['draft', 'in-review', 'retired'], 'published'],
  ['retire', ['senior', 'owner'], ['published'], 'retired'],
  ['reopen', ['senior', 'owner'], ['retired'], 'draft'],
])('%s is for %j from %j and leads to %s', (step, roles, from, to) => {
  for (const role of ROLES)
    for (const state of FAULT_STATES) {
      const answer = decide(state, role, step);
      const may = roles.includes(role) && from.includes(state);
      expect(answer.ok, `${role} from ${state}`).toBe(may);
      if (answer.ok) expect(answer.to).toBe(to);
      else expect(answer.why).toBe(roles.includes(role) ? 'not-from-here' : 'not-allowed');
    }
});

test('only the author takes a note back from review', () => {
  expect(decide('in-review', 'technician', 'take-back', { own: true }).ok).toBe(true);
  expect(decide('in-review', 'senior', 'take-back').ok).toBe(false);
  expect(decide('in-review', 'counter', 'take-back', { own: true }).ok).toBe(false);
});

test('a published note is published again, or its correction dropped, only when one waits', () => {
  for (const step of ['publish', 'drop'] as const) {
    expect(decide('published', 'senior', step).ok).toBe(false);
    expect(decide('published', 'senior', step, { correction: true })).toMatchObject({
      ok: true,
      to: 'published',
    });
    expect(decide('published', 'technician', step, { correction: true }).ok).toBe(false);
  }
});

test('sending back and retiring want a reason', () => {
  for (const [state, step] of [
    ['in-review', 'send-back'],
    ['published', 'retire'],
  ] as const)
    expect(decide(state, 'senior', step, {}, '  ')).toMatchObject({ why: 'missing', path: 'note' });
});

test('what is offered is what would be done', () => {
  for (const role of ROLES)
    for (const state of FAULT_STATES)
      for (const own of [true, false])
        for (const correction of [true, false]) {
          const now = { state, own, correction };
          const offered = offeredFaultSteps(now, role).map((s) => s.step);
          const taken = FAULT_STEPS.filter((s) => decideFaultStep(now, role, s, 'because').ok);
          expect(offered).toEqual(taken);
        }
});

test('what others rely on has to be complete', () => {
  const complete = FAULT_STEPS.filter((step) => {
    const answers = FAULT_STATES.map((s) =>
      decide(s, 'owner', step, { own: true, correction: true }),
    );
    return answers.some((a) => a.ok && a.complete);
  });
  expect(complete).toEqual(['submit', 'publish']);
});
