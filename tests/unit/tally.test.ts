import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { afterAll, expect, test } from 'vitest';
import { checkout } from '../fixtures/services';

type Tally = { passed: number; failed: number; why: string[] };
const { tallyOf } = (await import(`${checkout}src/cli/parts/tally.mjs`)) as {
  tallyOf: (file: string, exitCode: number | string) => Tally;
};

const folder = mkdtempSync(`${tmpdir()}/tally-`);
afterAll(() => rmSync(folder, { recursive: true }));

function tally(report: object, exitCode: number | string) {
  const file = `${folder}/report.json`;
  writeFileSync(file, JSON.stringify(report));
  return tallyOf(file, exitCode);
}

const file = (status: string, ...tests: string[]) => ({
  status,
  assertionResults: tests.map((each) => ({ status: each })),
});
const counts = (passed: number, failed: number, pending = 0, todo = 0) => ({
  numPassedTests: passed,
  numFailedTests: failed,
  numPendingTests: pending,
  numTodoTests: todo,
});

test('counts what passed and what failed', () => {
  const report = { ...counts(3, 1), testResults: [file('failed', 'passed', 'failed')] };
  expect(tally(report, 1)).toMatchObject({ passed: 3, failed: 1 });
  expect(tally({ ...counts(3, 0), testResults: [file('passed')] }, 0)).toEqual({
    passed: 3,
    failed: 0,
    why: [],
  });
});

test('a file that could not be read as tests counts as a failure', () => {
  const report = { ...counts(2, 0), testResults: [file('passed', 'passed'), file('failed')] };
  expect(tally(report, 1)).toMatchObject({ passed: 2, failed: 1 });
});

test('a part without any test has failed', () => {
  expect(tally({ ...counts(0, 0), testResults: [] }, 0)).toMatchObject({ passed: 0, failed: 1 });
});

test('tests left out have failed', () => {
  expect(tally({ ...counts(5, 0, 2, 1), testResults: [] }, 0)).toMatchObject({ failed: 3 });
});

test('a part that crashed has failed, with a report or without', () => {
  expect(tally({ ...counts(5, 0), testResults: [] }, 'SIGSEGV')).toMatchObject({ failed: 1 });
  expect(tallyOf(`${folder}/no-such-report.json`, 1)).toMatchObject({ passed: 0, failed: 1 });
});
