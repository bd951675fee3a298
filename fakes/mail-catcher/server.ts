import type { Server } from 'node:net';
import { FaultQueue } from '../shared/fault-queue';
import { RecentLog } from '../shared/log';
import { listen, stopListening } from '../shared/loopback';
import { mailControl } from './control';
import type { MailFault } from './faults';
import { inboxServer } from './inbox';
import { MessageStore } from './message-store';
import { smtpServer, type SmtpEvent } from './smtp';

export interface MailCatcherOptions {
  /** Folder of the messages; made when it is not there. */
  data: string;
  /** SMTP; 0 (the default) takes free ports. */
  port?: number;
  /** The inbox: pages and JSON. */
  httpPort?: number;
  controlPort?: number;
  /** Largest message in bytes, 10 MiB unless told. */
  maxMessageBytes?: number;
  /** Messages kept, 2000 unless told; the oldest go first. */
  maxMessages?: number;
  /** Milliseconds since 1970. */
  clock?: () => number;
}

export interface MailCatcher {
  port: number;
  httpPort: number;
  controlPort: number;
  close(): Promise<void>;
}

/**
 * Starts the mail catcher on 127.0.0.1: SMTP, inbox and control port.
 *
 * @throws Error when a port is taken or the data folder cannot be used
 */
export async function startMailCatcher(options: MailCatcherOptions): Promise<MailCatcher> {
  const service = {
    messages: await MessageStore.open(options.data, options.maxMessages ?? 2000),
    faults: new FaultQueue<MailFault>(),
    log: new RecentLog<SmtpEvent>(),
    clock: options.clock ?? Date.now,
    maxMessageBytes: options.maxMessageBytes ?? 10 * 1024 * 1024,
  };
  const smtp = smtpServer(service);
  const inbox = inboxServer(service.messages);
  const control = mailControl(service);
  const close = async () => {
    const smtpClosed = new Promise<void>((resolve) => smtp.close(() => resolve()));
    await Promise.all([smtpClosed, stopListening(inbox), stopListening(control)]);
  };
  try {
    return {
      port: await listen(smtp.server as Server, options.port ?? 0),
      httpPort: await listen(inbox, options.httpPort ?? 0),
      controlPort: await listen(control, options.controlPort ?? 0),
      close,
    };
  } catch (error) {
    await close();
    throw error;
  }
}
