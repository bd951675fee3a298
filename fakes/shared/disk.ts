import { open, rename, rm, readdir } from 'node:fs/promises';
import { dirname, join } from 'node:path';

/** Makes a rename or removal inside a folder survive a power cut. */
export async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/** Writes a file whole or not at all: a temporary beside it, synced, then renamed over it. */
export async function writeWhole(path: string, data: string | Buffer): Promise<void> {
  const temporary = `${path}.part`;
  const handle = await open(temporary, 'w');
  try {
    await handle.writeFile(data);
    await handle.sync();
  } finally {
    await handle.close();
  }
  await rename(temporary, path);
  await syncFolder(dirname(path));
}

/** Removes the entries of a folder that `unwanted` picks by name. */
export async function sweep(folder: string, unwanted: (name: string) => boolean): Promise<void> {
  for (const name of await readdir(folder)) {
    if (unwanted(name)) await rm(join(folder, name), { recursive: true, force: true });
  }
}
