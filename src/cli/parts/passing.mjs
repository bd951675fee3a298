// Data folders of test runs: one each, gone with the run; what a killed one left is cleared later.
import { existsSync, mkdirSync, readdirSync, rmSync } from 'node:fs';
import { endLeftOvers } from './children.mjs';
import { readJson } from './files.mjs';
import { cacheFolder } from './place.mjs';
import { stillLives } from './process-table.mjs';

const prefix = 'test-';
const lockFile = 'test.lock';

/** A folder for this process and the name of its lock, for `oneRun`. */
export async function passingFolder() {
  await clearKilledRuns();
  const folder = `${cacheFolder}/${prefix}${process.pid}`;
  mkdirSync(`${folder}/logs`, { recursive: true });
  return { folder, lockFile };
}

async function clearKilledRuns() {
  if (!existsSync(cacheFolder)) return;
  for (const name of readdirSync(cacheFolder)) {
    if (!name.startsWith(prefix)) continue;
    const folder = `${cacheFolder}/${name}`;
    const maker = name.slice(prefix.length);
    const lock = readJson(`${folder}/${lockFile}`, undefined);
    // Without a lock the run is either just beginning (its maker lives) or was killed there.
    if (lock ? stillLives(lock) : existsSync(`/proc/${maker}`)) continue;
    await endLeftOvers(folder, lock?.runId);
    rmSync(folder, { recursive: true, force: true });
  }
}
