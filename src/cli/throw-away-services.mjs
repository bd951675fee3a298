// A set of services for a test run by hand: prints what they are as one line of JSON and ends,
// with all it started, when its standard input closes (that is, when the process that asked ends).
import { rmSync } from 'node:fs';
import { passingFolder } from './parts/passing.mjs';
import { oneRun } from './parts/run.mjs';
import { sayOnStandardError, sayWhy } from './parts/say.mjs';
import { startTestServices } from './parts/test-services.mjs';

sayOnStandardError();
const asked = new Promise((resolve) => process.stdin.resume().on('close', resolve));
try {
  const place = await passingFolder();
  process.exitCode = await oneRun(
    { ...place, purpose: 'This set of services' },
    async ({ children, folder, ready }) => {
      process.stdout.write(`${JSON.stringify(await startTestServices(children, folder))}\n`);
      ready();
      await asked;
    },
  );
  rmSync(place.folder, { recursive: true, force: true });
} catch (error) {
  sayWhy(error);
  process.exitCode = 1;
}
process.exit();
