// The parts of `npm test`, in their order, and how each is run.
import { mkdirSync, rmSync } from 'node:fs';
import { readText } from './files.mjs';
import { root } from './place.mjs';
import { say, seconds } from './say.mjs';
import { tallyOf } from './tally.mjs';
import { testServicesName, withoutSettings } from './test-services.mjs';

const minutes = (n) => n * 60_000;
const bin = (path) => `${root}/node_modules/${path}`;

/** A check that passes or fails as one test; its output is shown when it fails. */
const check = (name, ...words) => ({ name, words, limit: minutes(8), needs: {} });

/** A vitest project; `needs` says what must be there before it. */
const project = (name, limit, needs) => ({ name, project: name, limit: minutes(limit), needs });

export const everyPart = [
  check('format', bin('prettier/bin/prettier.cjs'), '--check', '--log-level', 'warn', '.'),
  check(
    'lint',
    bin('eslint/bin/eslint.js'),
    '-c',
    'tests/eslint.config.js',
    '--max-warnings',
    '0',
    '.',
  ),
  check('types', bin('astro/astro.js'), 'check', '--minimumSeverity', 'warning'),
  project('unit', 8, {}),
  project('reference', 12, { programs: ['ngspice'] }),
  project('api', 20, { services: true, app: true }),
  project('faults', 15, { services: true, app: true }),
  project('e2e', 20, { services: true, app: true, programs: ['chromium'] }),
];

export const output = `${root}/tests/.output`;

/** Run one part; answers `{name, passed, failed, why}`. */
export async function runPart(children, part, services) {
  const since = performance.now();
  say(`\n── ${part.name} ${'─'.repeat(60 - part.name.length)}`);
  mkdirSync(output, { recursive: true });
  const outcome = part.project
    ? await runProject(children, part, services)
    : await runCheck(children, part);
  const { passed, failed, why } = outcome;
  const reasons = why.length > 0 ? ` (${why.join('; ')})` : '';
  say(`${part.name}: ${passed} passed, ${failed} failed${reasons}, ${seconds(since)}`);
  return { name: part.name, ...outcome };
}

async function runCheck(children, { name, words, limit }) {
  const log = `${output}/${name}.log`;
  rmSync(log, { force: true });
  const options = { cwd: root, env: withoutSettings, log, limit };
  const code = await children.run(name, process.execPath, words, options);
  if (code === 0) return { passed: 1, failed: 0, why: [] };
  say(readText(log));
  return { passed: 0, failed: 1, why: [`ended with ${code}`] };
}

async function runProject(children, part, services) {
  const report = `${output}/${part.project}.json`;
  rmSync(report, { force: true });
  const words = [
    bin('vitest/vitest.mjs'),
    'run',
    '--config=tests/vitest.config.ts',
    `--project=${part.project}`,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ];
  const told = services ? { [testServicesName]: JSON.stringify(services) } : {};
  const code = await children.run(part.name, process.execPath, words, {
    cwd: root,
    env: { ...withoutSettings, ...told },
    limit: part.limit,
  });
  return tallyOf(report, code);
}
