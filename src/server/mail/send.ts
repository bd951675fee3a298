import { createTransport } from 'nodemailer';
import type { Settings } from '../settings';
import type { Mail } from '../outbox/commands';

type Transport = ReturnType<typeof createTransport>;
let kept: { url: string; transport: Transport } | undefined;

function transportFor(url: string): Transport {
  if (kept?.url === url) return kept.transport;
  const { hostname, port, username, password, protocol } = new URL(url);
  const local = hostname === '127.0.0.1' || hostname === 'localhost';
  const transport = createTransport({
    host: hostname,
    port: Number(port || (protocol === 'smtps:' ? 465 : 587)),
    secure: protocol === 'smtps:',
    // Beyond this machine a mail with a secret in it never goes in the clear.
    ...(local ? { ignoreTLS: true } : { requireTLS: protocol !== 'smtps:' }),
    ...(username
      ? { auth: { user: decodeURIComponent(username), pass: decodeURIComponent(password) } }
      : {}),
    connectionTimeout: 10_000,
    socketTimeout: 20_000,
  });
  kept = { url, transport };
  return transport;
}

/** Sends one mail. @throws when the mail server does not take it: the outbox tries again. */
export async function sendMail(settings: Settings, mail: Mail): Promise<void> {
  await transportFor(settings.mail.url).sendMail({
    from: settings.mail.from,
    to: mail.to,
    subject: mail.subject,
    text: mail.text,
  });
}
