// The npm packages: installed from the lock file, again whenever it changed or an install was cut off.
import { existsSync, rmSync } from 'node:fs';
import { fingerprint, freshLog, readJson, readText, tail, writeWhole } from './files.mjs';
import { root } from './place.mjs';
import { Stop } from './say.mjs';

const stamp = `${root}/node_modules/.meterwright-stamp`;
/** npm's own list of what is installed; it writes it last. */
const npmList = `${root}/node_modules/.package-lock.json`;

const wanted = () =>
  `${fingerprint(root, ['package.json', 'package-lock.json', '.npmrc'])} node ${process.versions.modules} ${process.arch}\n`;

/** Whether the packages have to be installed. A finished install made by hand counts as one. */
export function packagesAreMissing() {
  if (readText(stamp) === wanted()) return false;
  if (existsSync(stamp) || !installedByHand()) return true;
  writeWhole(stamp, wanted());
  return false;
}

function installedByHand() {
  const locked = readJson(`${root}/package-lock.json`, {}).packages ?? {};
  const installed = readJson(npmList, {}).packages ?? {};
  return Object.entries(locked).every(([path, { version, integrity, optional }]) => {
    if (path === '') return true;
    const found = installed[path];
    if (!found) return optional === true;
    const same = found.version === version && found.integrity === integrity;
    return same && (existsSync(`${root}/${path}`) || optional === true);
  });
}

/**
 * `npm ci`, when needed. Answers what was done, in a few words.
 * @throws Stop when the registry cannot be reached, the disk is full, or npm says otherwise
 */
export async function ensurePackages(children) {
  if (!packagesAreMissing()) return 'there';
  rmSync(stamp, { force: true });
  rmSync(npmList, { force: true });
  const log = freshLog(`${children.folder}/logs`, 'npm');
  const [npm, ...before] = npmCommand();
  const words = ['ci', '--include=dev', '--no-audit', '--no-fund', '--no-progress'];
  const code = await children.run('npm ci', npm, [...before, ...words], {
    cwd: root,
    log,
    env: { NODE_ENV: undefined, PLAYWRIGHT_SKIP_BROWSER_DOWNLOAD: '1' },
  });
  if (code !== 0) throw new Stop(whyNot(readText(log)), tail(log));
  writeWhole(stamp, wanted());
  return 'installed';
}

/** The npm that runs this script, or the one on the path. */
function npmCommand() {
  const own = process.env.npm_execpath;
  return own?.endsWith('npm-cli.js') && existsSync(own) ? [process.execPath, own] : ['npm'];
}

function whyNot(text) {
  if (/ENOSPC/.test(text)) return 'The disk is full: free some space, then run the command again.';
  if (
    /ENOTFOUND|EAI_AGAIN|ECONNREFUSED|ECONNRESET|ETIMEDOUT|ENETUNREACH|EHOSTUNREACH|network/.test(
      text,
    )
  )
    return 'npm could not reach its package registry: check the network connection (or the registry and proxy npm is set to), then run the command again.';
  if (/EACCES|EPERM/.test(text))
    return 'npm may not write to node_modules: give this user the folder, then run the command again.';
  return 'npm ci failed: the lines below say why. Put that right, then run the command again.';
}
