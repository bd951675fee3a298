// Small files written whole or not at all, and fingerprints of folders.
import { createHash, randomBytes } from 'node:crypto';
import {
  closeSync,
  existsSync,
  fstatSync,
  openSync,
  readdirSync,
  readFileSync,
  readSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';

/** Write a file so that a reader sees the old text or the new, never half of it. */
export function writeWhole(path, text, mode = 0o644) {
  const half = `${path}.${process.pid}-${randomBytes(3).toString('hex')}`;
  try {
    writeFileSync(half, text, { mode });
    renameSync(half, path);
  } finally {
    rmSync(half, { force: true });
  }
}

/** Parsed JSON of a file, or `otherwise` when it is missing or is not JSON. */
export function readJson(path, otherwise) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return otherwise;
  }
}

/** Text of a file, or an empty string when there is none. */
export const readText = (path) => (existsSync(path) ? readFileSync(path, 'utf8') : '');

/** The last lines of a log, at most `lines`. */
export function tail(path, lines = 15) {
  if (!existsSync(path)) return '';
  const file = openSync(path, 'r');
  try {
    const size = fstatSync(file).size;
    const buffer = Buffer.alloc(Math.min(size, 16_384));
    readSync(file, buffer, 0, buffer.length, size - buffer.length);
    return buffer.toString('utf8').trimEnd().split('\n').slice(-lines).join('\n');
  } finally {
    closeSync(file);
  }
}

/**
 * Fingerprint (SHA-256, hex) of files and folders under `base`, by name and content. Missing ones
 * count as absent. `leaveOut` names paths relative to `base` that do not count.
 */
export function fingerprint(base, paths, leaveOut = []) {
  const hash = createHash('sha256');
  const walk = (path) => {
    if (leaveOut.includes(path)) return;
    const full = `${base}/${path}`;
    const entries = listFolder(full);
    if (entries) for (const entry of entries) walk(`${path}/${entry}`);
    else if (existsSync(full)) {
      const body = readFileSync(full);
      hash.update(`${path}\0${body.length}\0`).update(body);
    }
  };
  for (const path of paths) walk(path);
  return hash.digest('hex');
}

function listFolder(path) {
  try {
    return readdirSync(path).sort();
  } catch {
    return undefined;
  }
}

/** Log file `name.log` in `folder`, the earlier ones moved to `.1` and `.2`. Returns its path. */
export function freshLog(folder, name) {
  const path = `${folder}/${name}.log`;
  if (existsSync(`${path}.1`)) renameSync(`${path}.1`, `${path}.2`);
  if (existsSync(path)) renameSync(path, `${path}.1`);
  return path;
}
