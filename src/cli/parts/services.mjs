// MariaDB, object store and mail catcher, as far as the person does not bring their own.
import { ensureCommands } from './commands.mjs';
import { makeDatabaseFolder, startDatabase } from './database.mjs';
import { startMailCatcher, startStore } from './fakes.mjs';
import { keepPorts } from './ports.mjs';
import { step } from './say.mjs';
import { keepSecrets } from './secrets.mjs';
import { broughtAlong, servicePorts, settingsFor } from './settings.mjs';

/** Programs a local MariaDB needs. */
export const databaseCommands = ['mariadbd', 'mariadb-install-db', 'my_print_defaults'];

/** Install what the local services need from Debian, once. */
export async function installServices(children, given) {
  if (broughtAlong(given).database) return;
  await step('MariaDB programs', () => ensureCommands(children, databaseCommands));
}

/**
 * Start the services and answer `{env, ports, running}`: the app's environment, the ports in use,
 * and the started services as `{name, entry, again}` where `again()` starts one anew.
 * `without` names services (database, store, mail) to leave out although nobody brings them.
 */
export async function startServices(children, folder, { given, startOver, lasting, without = [] }) {
  const ports = await keepPorts(folder, servicePorts);
  const secrets = keepSecrets(folder);
  const leftOut = broughtAlong(given);
  for (const name of without) leftOut[name] = true;
  const env = settingsFor({ given, ports, secrets });
  const running = [];
  const add = (title, where, again) =>
    step(`${title} on ${where}`, async () => {
      running.push({ name: title, entry: await again(), again });
    });
  if (!leftOut.database) {
    await step('Database files', () => makeDatabaseFolder(children, folder));
    let fresh = startOver;
    await add('MariaDB', `port ${ports.database}`, () => {
      const options = { startOver: fresh, lasting };
      fresh = false;
      return startDatabase(children, folder, ports.database, secrets, options);
    });
  }
  if (!leftOut.store)
    await add('Object store', `port ${ports.store}`, () =>
      startStore(children, folder, ports, env),
    );
  if (!leftOut.mail)
    await add('Mail catcher', `ports ${ports.smtp} and ${ports.inbox}`, () =>
      startMailCatcher(children, folder, ports),
    );
  return { env, ports, running };
}
