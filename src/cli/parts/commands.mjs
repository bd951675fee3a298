// Programs of the system: where they are, and their Debian packages when they are missing.
import { accessSync, constants } from 'node:fs';
import { freshLog, readText, tail } from './files.mjs';
import { Stop } from './say.mjs';

const alsoIn = ['/usr/local/sbin', '/usr/sbin', '/sbin', '/usr/local/bin', '/usr/bin', '/bin'];

/** What the parts of Meterwright call, and the package that brings it. */
export const packageOf = {
  mariadbd: 'mariadb-server-core',
  'mariadb-install-db': 'mariadb-server-core',
  my_print_defaults: 'mariadb-client-core',
  chromium: 'chromium',
  ngspice: 'ngspice',
};

/**
 * Full path of a command, or undefined. `METERWRIGHT_MARIADBD` names another MariaDB server, for
 * one that is not on the path.
 */
export function findCommand(name) {
  if (name === 'mariadbd' && process.env.METERWRIGHT_MARIADBD)
    return process.env.METERWRIGHT_MARIADBD;
  const folders = [...(process.env.PATH ?? '').split(':').filter(Boolean), ...alsoIn];
  return folders.map((folder) => `${folder}/${name}`).find(runnable);
}

function runnable(path) {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** Packages still missing for these commands. */
export const missingPackages = (commands) => [
  ...new Set(commands.filter((name) => !findCommand(name)).map((name) => packageOf[name])),
];

/**
 * Install the packages these commands need from Debian. Answers what was done, in a few words.
 * @throws Stop with the one line to run when this user may not, or with apt's last lines
 */
export async function ensureCommands(children, commands) {
  const packages = missingPackages(commands);
  if (packages.length === 0) return 'there';
  const byHand = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(' ')}`;
  if (!findCommand('apt-get'))
    throw new Stop(
      `These programs are missing: ${commands.filter((name) => !findCommand(name)).join(', ')}. ` +
        `Install them (Debian's packages: ${packages.join(', ')}), then run this again.`,
    );
  if (process.getuid?.() !== 0)
    throw new Stop(
      `Some Debian packages are missing and only root may install them. Run this line, then start again:\n\n    sudo sh -c '${byHand}'`,
    );
  const log = freshLog(`${children.folder}/logs`, 'apt');
  const apt = (...args) =>
    children.run('apt-get', 'apt-get', ['-o', 'DPkg::Lock::Timeout=120', ...args], {
      log,
      env: { DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C' },
      grace: 60_000,
    });
  const install = () => apt('install', '-y', '--no-install-recommends', ...packages);
  const updated = await apt('update');
  let code = await install();
  if (code !== 0 && readText(log).includes('dpkg --configure -a')) {
    await children.run('dpkg', 'dpkg', ['--configure', '-a'], { log, grace: 60_000 });
    code = await install();
  }
  if (code !== 0 || missingPackages(commands).length > 0)
    throw new Stop(whyNot(readText(log), updated, byHand), tail(log));
  return `installed ${packages.join(', ')}`;
}

function whyNot(text, updated, byHand) {
  if (/No space left|not have enough free space|ENOSPC/.test(text))
    return 'The disk is full: free some space, then run the command again.';
  if (updated !== 0 || /Could not resolve|Unable to fetch|Failed to fetch/.test(text))
    return "Debian's package servers could not be reached: check the network connection, then run the command again.";
  return `Debian's packages could not be installed. Try this line by hand, then run the command again:\n\n    ${byHand}`;
}
