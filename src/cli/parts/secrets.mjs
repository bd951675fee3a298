// Passwords and keys of a local run: made once, kept where only the owner of the folder reads them.
import { randomBytes } from 'node:crypto';
import { readJson, writeWhole } from './files.mjs';

const makers = {
  databaseRoot: () => randomBytes(24).toString('base64url'),
  databaseApp: () => randomBytes(24).toString('base64url'),
  appSecret: () => randomBytes(48).toString('base64'),
  storeKey: () => `MW${randomBytes(9).toString('hex').toUpperCase()}`,
  storeSecret: () => randomBytes(30).toString('base64url'),
};

/** The secrets of a data folder; missing ones are made and kept in `secrets.json`, mode 600. */
export function keepSecrets(folder) {
  const file = `${folder}/secrets.json`;
  const kept = readJson(file, {});
  const secrets = Object.fromEntries(
    Object.entries(makers).map(([name, make]) => [name, kept[name] ?? make()]),
  );
  writeWhole(file, JSON.stringify(secrets, null, 2), 0o600);
  return secrets;
}
