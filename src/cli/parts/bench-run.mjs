// Measures every file of tests/bench, one after the other, each in a process of its own.
import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import { ensureBuild } from './build.mjs';
import { ensureCommands } from './commands.mjs';
import { freshLog, readJson, readText, tail, writeWhole } from './files.mjs';
import { ensurePackages } from './packages.mjs';
import { passingFolder } from './passing.mjs';
import { root } from './place.mjs';
import { oneRun } from './run.mjs';
import { say, sayOnStandardError, sayWhy, step, Stop } from './say.mjs';
import { databaseCommands } from './services.mjs';
import { output } from './test-parts.mjs';
import { startTestServices, testServicesName, withoutSettings } from './test-services.mjs';

const folderOfRows = `${root}/tests/bench`;
const written = `${output}/bench.json`;

/** Measure, print a table (or JSON) and write `tests/.output/bench.json`. Answers the exit code. */
export async function runBench({ json }) {
  if (json) sayOnStandardError();
  try {
    const place = await passingFolder();
    const code = await oneRun({ ...place, purpose: 'This benchmark' }, (run) => work(run, json));
    rmSync(place.folder, { recursive: true, force: true });
    return code;
  } catch (error) {
    sayWhy(error);
    return 1;
  }
}

async function work({ children, folder }, json) {
  await step('Programs', () => ensureCommands(children, databaseCommands));
  await step('Packages (npm ci)', () => ensurePackages(children));
  const services = await startTestServices(children, folder);
  let entry;
  await step('Build', async () => {
    entry = await ensureBuild(children);
  });
  const told = { [testServicesName]: JSON.stringify({ ...services, entry }) };
  const rows = [];
  let failures = 0;
  for (const name of files())
    try {
      await step(`Measuring ${name}`, async () => {
        rows.push(...(await measure(children, folder, name, told)));
      });
    } catch (error) {
      failures += 1;
      sayWhy(error);
    }
  if (rows.length === 0)
    throw new Stop('No file of tests/bench offers rows: nothing was measured.');
  mkdirSync(output, { recursive: true });
  const text = JSON.stringify({ node: process.version, rows }, null, 2);
  writeWhole(written, `${text}\n`);
  if (json) process.stdout.write(`${text}\n`);
  else sayTable(rows);
  return failures > 0 ? 1 : 0;
}

/** Files that offer rows; the others are what those share. */
const files = () =>
  readdirSync(folderOfRows)
    .filter((name) => name.endsWith('.ts'))
    .filter((name) =>
      /export (async function|const) rows\b/.test(readText(`${folderOfRows}/${name}`)),
    )
    .sort();

async function measure(children, folder, name, told) {
  const log = freshLog(`${folder}/logs`, 'bench');
  const answer = `${folder}/rows.json`;
  rmSync(answer, { force: true });
  const script = `${root}/src/cli/bench-rows.ts`;
  const code = await children.run(
    name,
    process.execPath,
    ['--import', 'tsx', script, `${folderOfRows}/${name}`, answer],
    { cwd: root, log, env: { ...withoutSettings, ...told }, limit: 900_000 },
  );
  const rows = readJson(answer, undefined);
  if (code !== 0 || !Array.isArray(rows))
    throw new Stop(`tests/bench/${name} ended with ${code} and gave no rows.`, tail(log, 25));
  return rows;
}

function sayTable(rows) {
  const shown = rows.map(({ name, ours_ms, other_ms, ratio, note }) => [
    name,
    ours_ms.toFixed(3),
    other_ms.toFixed(3),
    ratio.toFixed(2),
    note ?? '',
  ]);
  const all = [['what', 'ours, ms', 'other, ms', 'ours / other', 'beside'], ...shown];
  const widths = all[0].map((_, column) => Math.max(...all.map((row) => row[column].length)));
  say('');
  for (const row of all)
    say(
      `  ${row.map((cell, i) => (i === 0 || i === 4 ? cell.padEnd(widths[i]) : cell.padStart(widths[i]))).join('  ')}`.trimEnd(),
    );
  say(`\n  Written to ${written}`);
}
