/** The settings, read from the environment once and validated whole: every fault is named, not only the first. */
import * as z from 'zod/v4';

const flag = z
  .enum(['0', '1', ''])
  .default('')
  .transform((v) => v === '1');
const url = (what: string) => z.url(`${what} is needed, as an address.`);

const Env = z
  .object({
    DATABASE_URL: url('The MariaDB address'),
    PUBLIC_ORIGIN: url('The address customers open').transform((v) => new URL(v).origin),
    APP_SECRET: z.string().min(32, 'At least 32 characters of randomness are needed.'),
    DEMO: flag,
    TRUST_PROXY: flag,
    S3_ENDPOINT: z.url().optional(),
    S3_PUBLIC_ENDPOINT: z.url().optional(),
    S3_REGION: z.string().default('us-east-1'),
    S3_BUCKET: z.string().min(3),
    S3_KEY: z.string().min(1),
    S3_SECRET: z.string().min(1),
    SMTP_URL: z.string().min(1),
    MAIL_FROM: z.string().min(3),
    MAIL_INBOX_URL: z.url().optional(),
    SHOP_NAME: z.string().default('Harrow Lane Instruments'),
    SHOP_TIMEZONE: z.string().default('Europe/Amsterdam'),
    SHOP_CURRENCY: z.string().length(3).default('EUR'),
    SHOP_ADDRESS: z.string().default('14 Harrow Lane, Exampleton'),
    LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info'),
    WORKER: z.enum(['0', '1']).default('1'),
    DB_POOL: z.coerce.number().int().min(2).max(100).default(10),
  })
  .refine((e) => e.DEMO || e.PUBLIC_ORIGIN.startsWith('https://') || isLoopback(e.PUBLIC_ORIGIN), {
    path: ['PUBLIC_ORIGIN'],
    message: 'Outside demo mode the address must be https (or a loopback address behind one).',
  });

function isLoopback(origin: string): boolean {
  const host = new URL(origin).hostname;
  return host === 'localhost' || host === '127.0.0.1' || host === '[::1]';
}

export type Settings = ReturnType<typeof readSettings>;

/** @throws {Error} with every faulty setting by name, and what it needs. */
export function readSettings(env: Record<string, string | undefined>) {
  const parsed = Env.safeParse(env);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((i) => `  ${i.path.join('.')}: ${i.message}`);
    throw new Error(`These settings need attention (see .env.example):\n${lines.join('\n')}`);
  }
  const e = parsed.data;
  return {
    databaseUrl: e.DATABASE_URL,
    databasePool: e.DB_POOL,
    origin: e.PUBLIC_ORIGIN,
    secureCookies: e.PUBLIC_ORIGIN.startsWith('https://'),
    secret: e.APP_SECRET,
    demo: e.DEMO,
    trustProxy: e.TRUST_PROXY,
    worker: e.WORKER === '1',
    logLevel: e.LOG_LEVEL,
    store: {
      endpoint: e.S3_ENDPOINT,
      publicEndpoint: e.S3_PUBLIC_ENDPOINT ?? e.S3_ENDPOINT,
      region: e.S3_REGION,
      bucket: e.S3_BUCKET,
      key: e.S3_KEY,
      secret: e.S3_SECRET,
    },
    mail: { url: e.SMTP_URL, from: e.MAIL_FROM, inbox: e.MAIL_INBOX_URL },
    shop: {
      name: e.SHOP_NAME,
      address: e.SHOP_ADDRESS,
      timeZone: e.SHOP_TIMEZONE,
      currency: e.SHOP_CURRENCY,
    },
  };
}
