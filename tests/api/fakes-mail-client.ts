import { createTransport, type SendMailOptions } from 'nodemailer';
import { json } from './fakes-client';

/** A message as the inbox tells it. */
export interface Message {
  id: string;
  receivedAt: string;
  mailFrom: string;
  recipients: string[];
  from: string;
  to: string;
  subject: string;
  text?: string;
  html?: string;
  links: string[];
  headers: Array<{ name: string; value: string }>;
  attachments: Array<{ filename: string; contentType: string; size: number; path: string }>;
}

/** Sends messages over one connection, from the shop's desk to Ida unless told otherwise. */
export async function send(port: number, ...messages: SendMailOptions[]): Promise<void> {
  const options = { host: '127.0.0.1', port, secure: false, ignoreTLS: true, maxConnections: 1 };
  const transport = createTransport({ ...options, pool: messages.length > 1, maxMessages: 1000 });
  const from = 'Harrow Lane Instruments <desk@harrow-lane.example>';
  try {
    for (const message of messages) {
      await transport.sendMail({ from, to: 'ida@example.org', ...message });
    }
  } finally {
    transport.close();
  }
}

/** The reply code a message was refused with, 0 for a lost connection, 250 when it was taken. */
export async function replyTo(port: number, message: SendMailOptions = {}): Promise<number> {
  try {
    await send(port, { subject: 's', text: 't', ...message });
    return 250;
  } catch (error) {
    return (error as { responseCode?: number }).responseCode ?? 0;
  }
}

/** The messages of an inbox, newest first, or those to one recipient. */
export async function list(inbox: string, to?: string): Promise<Message[]> {
  const query = to === undefined ? '' : `?to=${encodeURIComponent(to)}`;
  return (await json<{ messages: Message[] }>(`${inbox}/api/messages${query}`)).messages;
}
