// The environment the app is given: what the person set stands, the rest points at local stand-ins.
import { loopback } from './ports.mjs';

/** Ports a full set of local services needs, by the names `ports.json` keeps them under. */
export const servicePorts = ['database', 'store', 'storeControl', 'smtp', 'inbox', 'mailControl'];

/** Which services the person brings: those get no local stand-in. */
export const broughtAlong = (given) => ({
  database: Boolean(given.DATABASE_URL),
  store: Boolean(given.S3_ENDPOINT),
  mail: Boolean(given.SMTP_URL),
});

/**
 * Every setting of the app (`.env.example` explains them), as far as it is known here. Values in
 * `given` win over the ones made up for the local services.
 */
export function settingsFor({ given, ports, secrets, databaseName = 'meterwright' }) {
  const port = Number(given.PORT ?? 4321);
  const own = { HOST: loopback, PORT: String(port), PUBLIC_ORIGIN: `http://${loopback}:${port}` };
  const brought = broughtAlong(given);
  const database = brought.database
    ? {}
    : {
        DATABASE_URL: `mysql://meterwright:${secrets.databaseApp}@${loopback}:${ports.database}/${databaseName}`,
      };
  const store = brought.store
    ? { S3_PUBLIC_ENDPOINT: given.S3_ENDPOINT }
    : {
        S3_ENDPOINT: `http://${loopback}:${ports.store}`,
        S3_PUBLIC_ENDPOINT: `http://${loopback}:${ports.store}`,
        S3_KEY: secrets.storeKey,
        S3_SECRET: secrets.storeSecret,
      };
  const mail = brought.mail
    ? {}
    : {
        SMTP_URL: `smtp://${loopback}:${ports.smtp}`,
        MAIL_INBOX_URL: `http://${loopback}:${ports.inbox}`,
      };
  const made = {
    NODE_ENV: 'production',
    DEMO: '1',
    APP_SECRET: secrets.appSecret,
    S3_REGION: 'eu-central-1',
    S3_BUCKET: 'meterwright',
    MAIL_FROM: 'Harrow Lane Instruments <bench@meterwright.example>',
    SHOP_TIMEZONE: 'Europe/Amsterdam',
    LOG_LEVEL: 'info',
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    ...own,
    ...database,
    ...store,
    ...mail,
  };
  return Object.fromEntries(
    Object.entries(made).map(([name, value]) => [name, given[name] || value]),
  );
}
