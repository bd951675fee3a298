// Builds the app when its sources changed and prints where its server is: for tests run by hand.
import { rmSync } from 'node:fs';
import { ensureBuild } from './parts/build.mjs';
import { passingFolder } from './parts/passing.mjs';
import { oneRun } from './parts/run.mjs';
import { sayOnStandardError, step } from './parts/say.mjs';

sayOnStandardError();
const place = await passingFolder();
process.exitCode = await oneRun({ ...place, purpose: 'This build' }, async ({ children }) => {
  let entry;
  await step('Build', async () => {
    entry = await ensureBuild(children);
  });
  process.stdout.write(`${entry}\n`);
});
rmSync(place.folder, { recursive: true, force: true });
process.exit();
