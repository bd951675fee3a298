// The set of services tests run against, and how they are told of it.
import { settingNames } from './settings.mjs';
import { startServices } from './services.mjs';
import { loopback } from './ports.mjs';

/** Variable that carries the description, as JSON, to the test processes. */
export const testServicesName = 'MW_TEST_SERVICES';

/** Environment that keeps a person's own settings away from a test. */
export const withoutSettings = Object.fromEntries(settingNames.map((name) => [name, undefined]));

/**
 * Start MariaDB, object store and mail catcher for tests and describe them as
 * `tests/fixtures/services.ts` reads it.
 */
export async function startTestServices(children, folder) {
  const { env, ports } = await startServices(children, folder, { given: {}, lasting: false });
  return {
    databaseUrl: env.DATABASE_URL,
    s3: {
      endpoint: env.S3_ENDPOINT,
      region: env.S3_REGION,
      bucket: env.S3_BUCKET,
      key: env.S3_KEY,
      secret: env.S3_SECRET,
    },
    smtpUrl: env.SMTP_URL,
    mailInboxUrl: env.MAIL_INBOX_URL,
    control: {
      store: `http://${loopback}:${ports.storeControl}`,
      mail: `http://${loopback}:${ports.mailControl}`,
    },
  };
}
