import type { Socket } from 'node:net';
import { setTimeout as pause } from 'node:timers/promises';
import { SMTPServer, type SMTPServerSession } from 'smtp-server';
import type { FaultQueue } from '../shared/fault-queue';
import type { RecentLog } from '../shared/log';
import { fits, type MailFault } from './faults';
import type { MessageStore } from './message-store';

/** What happened at one step of an SMTP session. */
export interface SmtpEvent {
  /** ISO 8601. */
  at: string;
  session: string;
  stage: MailFault['stage'];
  recipients: string[];
  result: 'accepted' | 'refused' | 'dropped';
  /** Id of the message kept. */
  message?: string;
  fault?: MailFault['kind'] | undefined;
}

export interface SmtpService {
  messages: MessageStore;
  faults: FaultQueue<MailFault>;
  log: RecentLog<SmtpEvent>;
  clock: () => number;
  maxMessageBytes: number;
}

/** A refusal with the reply code the client is told. */
class Refusal extends Error {
  constructor(
    readonly responseCode: number,
    message: string,
  ) {
    super(message);
  }
}

/** Thrown to end a step whose connection was cut: nobody is left to be told. */
class Dropped extends Error {}

async function readAll(stream: AsyncIterable<Buffer>, limit: number): Promise<Buffer | undefined> {
  const pieces: Buffer[] = [];
  let size = 0;
  for await (const piece of stream) {
    size += piece.length;
    if (size <= limit) pieces.push(piece);
  }
  return size <= limit ? Buffer.concat(pieces) : undefined;
}

/** An SMTP server that takes every message, for any recipient, without TLS or sign-in. */
export function smtpServer(service: SmtpService): SMTPServer {
  const { faults, log, messages, clock, maxMessageBytes } = service;
  const sockets = new Map<number, Socket>();

  const cut = (session: SMTPServerSession): never => {
    sockets.get(session.remotePort)?.destroy();
    throw new Dropped();
  };

  /** Runs one step of a session with the fault that waits for it, and logs how it ended. */
  async function step(
    stage: SmtpEvent['stage'],
    session: SMTPServerSession,
    recipients: string[],
    work: () => Promise<string | undefined>,
  ): Promise<void> {
    const fault = faults.take((each) => fits(each, stage, recipients));
    const at = new Date(clock()).toISOString();
    const event: SmtpEvent = { at, session: session.id, stage, recipients, result: 'accepted' };
    event.fault = fault?.kind;
    log.add(event);
    try {
      if (fault?.kind === 'delay') await pause(fault.ms);
      if (fault?.kind === 'reject') throw new Refusal(fault.code, fault.message);
      if (fault?.kind === 'drop' && fault.when === 'before') cut(session);
      const message = await work();
      if (message !== undefined) event.message = message;
      if (fault?.kind === 'drop') cut(session);
    } catch (error) {
      event.result = error instanceof Dropped ? 'dropped' : 'refused';
      throw error;
    }
  }

  function settle(done: Promise<void>, callback: (error?: Error | null) => void): void {
    done.then(
      () => callback(),
      (error: unknown) => {
        if (!(error instanceof Refusal) && !(error instanceof Dropped)) console.error(error);
        callback(error instanceof Refusal ? error : new Refusal(451, 'the message was not taken'));
      },
    );
  }

  const server = new SMTPServer({
    name: 'mail.example.test',
    banner: 'mail catcher',
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    size: maxMessageBytes,
    logger: false,
    closeTimeout: 1000,
    onConnect: (session, callback) => {
      settle(
        step('connect', session, [], async () => undefined),
        callback,
      );
    },
    onRcptTo: ({ address }, session, callback) => {
      settle(
        step('rcpt', session, [address], async () => undefined),
        callback,
      );
    },
    onData: (stream, session, callback) => {
      const { mailFrom, rcptTo } = session.envelope;
      const recipients = rcptTo.map(({ address }) => address);
      const whole = readAll(stream, maxMessageBytes);
      const keep = async () => {
        const source = await whole;
        if (source === undefined) {
          throw new Refusal(552, `a message may have ${maxMessageBytes} bytes`);
        }
        const from = mailFrom === false ? '' : mailFrom.address;
        return (await messages.add(source, from, recipients, clock())).id;
      };
      const taken = whole.then(() => step('data', session, recipients, keep));
      settle(taken, callback);
    },
  });
  server.server.on('connection', (socket: Socket) => {
    const { remotePort } = socket;
    if (remotePort === undefined) return;
    sockets.set(remotePort, socket);
    socket.once('close', () => sockets.delete(remotePort));
  });
  // A client that goes away in the middle is no failure of this server.
  server.on('error', () => undefined);
  return server;
}
