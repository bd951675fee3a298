// The built app, one folder per state of the sources: a build that was cut off is never used, and
// a shop that is running keeps its files while another state is built.
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync } from 'node:fs';
import { fingerprint, freshLog, tail } from './files.mjs';
import { cacheFolder, root } from './place.mjs';
import { withArgument } from './process-table.mjs';
import { Stop } from './say.mjs';

const builds = `${cacheFolder}/builds`;
const sources = [
  'src',
  'public',
  'content',
  'astro.config.mjs',
  'package-lock.json',
  'tsconfig.json',
];

const entryOf = (folder) => `${folder}/server/entry.mjs`;

/** Where the build of the present sources is or will be, and whether it is there. */
export function presentBuild() {
  const state = fingerprint(root, sources, ['src/cli']).slice(0, 16);
  const entry = entryOf(`${builds}/${state}`);
  return { folder: `${builds}/${state}`, entry, there: existsSync(entry) };
}

/**
 * Build the app when the sources have no build yet. Answers the path of the server to start.
 * @throws Stop with the build's last lines
 */
export async function ensureBuild(children) {
  const { folder, entry, there } = presentBuild();
  if (there) return entry;
  mkdirSync(builds, { recursive: true });
  const making = `${builds}/making-${process.pid}`;
  const log = freshLog(`${children.folder}/logs`, 'build');
  const astro = `${root}/node_modules/astro/astro.js`;
  const code = await children.run('build', process.execPath, [astro, 'build', '--outDir', making], {
    cwd: root,
    log,
    env: { NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1' },
    limit: 600_000,
  });
  if (code !== 0 || !existsSync(entryOf(making))) {
    rmSync(making, { recursive: true, force: true });
    throw new Stop('The app could not be built: the last lines say why.', tail(log, 40));
  }
  if (existsSync(entry)) rmSync(making, { recursive: true });
  else renameSync(making, folder);
  sweep(folder);
  return entry;
}

/** Keep the last three builds and those a process is running from. */
function sweep(present) {
  const folders = readdirSync(builds)
    .map((name) => `${builds}/${name}`)
    .filter((folder) => folder !== present)
    .sort((a, b) => statSync(b).mtimeMs - statSync(a).mtimeMs);
  for (const [rank, folder] of folders.entries()) {
    const half = /making-\d+$/.exec(folder);
    const beingMade = half && existsSync(`/proc/${half[0].slice(7)}`);
    const running = withArgument(entryOf(folder)).length > 0;
    if (!beingMade && !running && (half || rank >= 2)) rmSync(folder, { recursive: true });
  }
}
