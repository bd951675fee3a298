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
  if (!leftOut.database) {
    await step('Database files', () => makeDatabaseFolder(children, folder));
    let fresh = startOver;
    const again = () => {
      const options = { startOver: fresh, lasting };
      fresh = false;
      return startDatabase(children, folder, ports.database, secrets, options);
    };
    await step(`MariaDB on port ${ports.database}`, async () => {
      running.push({ name: 'MariaDB', entry: await again(), again });
    });
  }
  const fakes = [
    ['store', 'Object store', () => startStore(children, folder, ports, env)],
    ['mail', 'Mail catcher', () => startMailCatcher(children, folder, ports)],
  ].filter(([name]) => !leftOut[name]);
  if (fakes.length > 0)
    await step(fakes.map(([, title]) => title).join(' and '), async () => {
      const add = async ([, name, again]) => running.push({ name, entry: await again(), again });
      await Promise.all(fakes.map(add));
    });
  return { env, ports, running };
}
