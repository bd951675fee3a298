// The environment the app is given: what the person set stands, the rest points at local stand-ins.
import { loopback } from './ports.mjs';

/** Ports a full set of local services needs, by the names `ports.json` keeps them under. */
export const servicePorts = ['database', 'store', 'storeControl', 'smtp', 'inbox', 'mailControl'];

/** Every setting the app knows, by name. */
export const settingNames = [
  'NODE_ENV',
  'HOST',
  'PORT',
  'PUBLIC_ORIGIN',
  'DATABASE_URL',
  'DB_POOL',
  'APP_SECRET',
  'DEMO',
  'TRUST_PROXY',
  'S3_ENDPOINT',
  'S3_PUBLIC_ENDPOINT',
  'S3_REGION',
  'S3_BUCKET',
  'S3_KEY',
  'S3_SECRET',
  'SMTP_URL',
  'MAIL_FROM',
  'MAIL_INBOX_URL',
  'SHOP_NAME',
  'SHOP_ADDRESS',
  'SHOP_TIMEZONE',
  'SHOP_CURRENCY',
  'LOG_LEVEL',
  'WORKER',
];

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
    S3_REGION: 'us-east-1',
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
  // A setting left empty in the environment counts as not given: undefined keeps it from the app.
  const names = [...new Set([...settingNames, ...Object.keys(made)])];
  return Object.fromEntries(names.map((name) => [name, given[name] || made[name]]));
}
