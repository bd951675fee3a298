// One run of the tests: what the chosen parts need first, then the parts, then the count.
import { parseArgs } from 'node:util';
import { rmSync } from 'node:fs';
import { ensureBuild } from './build.mjs';
import { ensureCommands } from './commands.mjs';
import { needRoom, roomToInstall, roomToRun } from './disk.mjs';
import { ensurePackages, packagesAreMissing } from './packages.mjs';
import { passingFolder } from './passing.mjs';
import { root } from './place.mjs';
import { oneRun } from './run.mjs';
import { say, sayWhy, seconds, step, Stop } from './say.mjs';
import { databaseCommands } from './services.mjs';
import { total } from './tally.mjs';
import { everyPart, output, runPart } from './test-parts.mjs';
import { startTestServices } from './test-services.mjs';

/** Run the tests named on the command line (all unless `--only a,b`). Answers the exit code. */
export async function runTests() {
  const since = performance.now();
  const outcomes = [];
  let chosen = everyPart;
  try {
    chosen = chosenParts();
    const place = await passingFolder();
    await oneRun({ ...place, purpose: 'This test run' }, (run) => work(run, chosen, outcomes));
    rmSync(place.folder, { recursive: true, force: true });
  } catch (error) {
    sayWhy(error);
  }
  const unrun = chosen.filter((part) => !outcomes.some(({ name }) => name === part.name));
  for (const { name } of unrun)
    outcomes.push({ name, passed: 0, failed: 1, why: ['could not be run'] });
  say('');
  for (const { name, passed, failed, why } of outcomes)
    say(`  ${name.padEnd(10)} ${passed} passed, ${failed} failed  ${why.join('; ')}`.trimEnd());
  say(`  in ${seconds(since)}`);
  const { passed, failed } = total(outcomes);
  say(`${passed} passed, ${failed} failed`);
  return failed > 0 ? 1 : 0;
}

function chosenParts() {
  const { values } = parseArgs({ options: { only: { type: 'string' } } });
  if (values.only === undefined) return everyPart;
  const names = values.only.split(',');
  const known = everyPart.map((part) => part.name);
  const strange = names.filter((name) => !known.includes(name));
  if (strange.length > 0)
    throw new Stop(`--only names ${strange.join(', ')}; the parts are ${known.join(', ')}.`);
  return everyPart.filter((part) => names.includes(part.name));
}

async function work({ children, folder }, chosen, outcomes) {
  rmSync(`${output}/apps`, { recursive: true, force: true });
  const anyNeeds = (what) => chosen.some((part) => part.needs[what]);
  await step('Free space', () => needRoom(root, packagesAreMissing() ? roomToInstall : roomToRun));
  const programs = [
    ...(anyNeeds('services') ? databaseCommands : []),
    ...chosen.flatMap((part) => part.needs.programs ?? []),
  ];
  await step('Programs', () => ensureCommands(children, programs));
  await step('Packages (npm ci)', () => ensurePackages(children));
  const services = anyNeeds('services') ? await startTestServices(children, folder) : undefined;
  let entry;
  if (anyNeeds('app'))
    try {
      await step('Build', async () => void (entry = await ensureBuild(children)));
    } catch (error) {
      sayWhy(error);
    }
  for (const part of chosen) {
    if (part.needs.app && !entry) continue;
    outcomes.push(await runPart(children, part, services && { ...services, entry }));
  }
}
