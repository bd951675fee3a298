// Tables and demo data: made on the first run, brought up to date when the migrations changed.
import { existsSync, rmSync, writeFileSync } from 'node:fs';
import { fingerprint, freshLog, readText, tail, writeWhole } from './files.mjs';
import { root } from './place.mjs';
import { step, Stop } from './say.mjs';
import { broughtAlong } from './settings.mjs';

const unfinished = (folder) => `${folder}/first-run-unfinished`;
const filledStamp = (folder) => `${folder}/filled.stamp`;

/**
 * The first run fills an empty database. Until it is done a note says so: found again, it means
 * that the filling was cut off and starts over (nobody can have worked in that shop yet).
 * Answers whether the database is to be emptied.
 */
export function beginFirstRun(folder, given) {
  if (broughtAlong(given).database) return false;
  if (!existsSync(`${folder}/mariadb`)) writeFileSync(unfinished(folder), '');
  if (!existsSync(unfinished(folder))) return false;
  for (const name of ['object-store', 'mail-catcher', 'filled.stamp'])
    rmSync(`${folder}/${name}`, { recursive: true, force: true });
  return true;
}

/** Make or update the tables and, in demo mode, the demo shop; both leave finished work alone. */
export async function fill(children, folder, given, env) {
  const wanted = `${fingerprint(root, ['drizzle'])} demo ${env.DEMO}\n`;
  const ours = !broughtAlong(given).database;
  if (ours && readText(filledStamp(folder)) === wanted) return;
  await step('Tables', () => script(children, 'migrate', env));
  if (env.DEMO === '1') await step('Demo shop', () => script(children, 'seed', env));
  if (ours) writeWhole(filledStamp(folder), wanted);
  rmSync(unfinished(folder), { force: true });
}

/** Run `src/cli/<name>.ts`. @throws Stop with its last lines */
async function script(children, name, env) {
  const log = freshLog(`${children.folder}/logs`, name);
  const words = ['--import', 'tsx', `${root}/src/cli/${name}.ts`];
  const code = await children.run(name, process.execPath, words, { cwd: root, log, env });
  if (code !== 0)
    throw new Stop(
      `src/cli/${name}.ts ended with ${code}: the last lines say why. Put that right, then start again.`,
      tail(log, 25),
    );
}
