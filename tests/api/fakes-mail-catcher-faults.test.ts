import { afterAll, beforeAll, beforeEach, describe, expect, it, onTestFinished } from 'vitest';
import { startMailCatcher, type MailCatcher } from '../../fakes/mail-catcher/server';
import { command, end, json, refusedStart, temporaryFolder } from './fakes-client';
import { list, replyTo, send } from './fakes-mail-client';

let mail: MailCatcher;
let folder: Awaited<ReturnType<typeof temporaryFolder>>;
let inbox: string;
let control: string;

beforeAll(async () => {
  folder = await temporaryFolder();
  mail = await startMailCatcher({ data: folder.path, maxMessageBytes: 100_000, maxMessages: 60 });
  inbox = `http://127.0.0.1:${mail.httpPort}`;
  control = `http://127.0.0.1:${mail.controlPort}`;
});
afterAll(async () => {
  await mail.close();
  await folder.remove();
});
beforeEach(async () => {
  await json(`${inbox}/api/messages`, 'DELETE');
  await json(`${control}/faults`, 'DELETE');
  await json(`${control}/requests`, 'DELETE');
});

describe('faults asked for', () => {
  const ask = (fault: object) => json(`${control}/faults`, 'POST', fault);

  it.each([
    ['rcpt', 450],
    ['rcpt', 550],
    ['data', 451],
    ['data', 554],
    ['connect', 421],
  ])('refuse at %s with %i, twice, then no more', async (stage, code) => {
    await ask({ kind: 'reject', stage, code, times: 2 });
    expect([await replyTo(mail.port), await replyTo(mail.port), await replyTo(mail.port)]).toEqual([
      code,
      code,
      250,
    ]);
    expect(await list(inbox)).toHaveLength(1);
  });

  it('keep to their recipient', async () => {
    await ask({ match: { to: 'Ida@example.org' }, kind: 'reject', code: 550, times: 9 });
    expect(await replyTo(mail.port, { to: 'bo@example.org' })).toBe(250);
    expect(await replyTo(mail.port, { to: 'ida@example.org' })).toBe(550);
  });

  it('drop the connection before the message is kept, or after it with the answer lost', async () => {
    await ask({ kind: 'drop', stage: 'rcpt' });
    expect(await replyTo(mail.port)).toBe(0);
    await ask({ kind: 'drop', stage: 'data' });
    expect(await replyTo(mail.port)).toBe(0);
    expect(await list(inbox)).toEqual([]);
    await ask({ kind: 'drop', stage: 'data', when: 'after' });
    expect(await replyTo(mail.port)).toBe(0);
    expect(await list(inbox)).toHaveLength(1);
  });

  it('delay', async () => {
    await ask({ kind: 'delay', stage: 'data', ms: 150 });
    const start = performance.now();
    expect(await replyTo(mail.port)).toBe(250);
    expect(performance.now() - start).toBeGreaterThanOrEqual(149);
  });

  it('are refused when they make no sense or would break the protocol', async () => {
    await expect(ask({ kind: 'reject', code: 250 })).rejects.toThrow('400');
    await expect(ask({ kind: 'reject', message: 'no\r\n250 OK' })).rejects.toThrow('400');
    await expect(ask({ kind: 'drop', stage: 'connect', match: { to: 'a' } })).rejects.toThrow(
      '400',
    );
  });

  it('are logged with what they did', async () => {
    await ask({ kind: 'reject', stage: 'rcpt', code: 450 });
    await replyTo(mail.port);
    await replyTo(mail.port);
    const { requests } = await json<{ requests: object[] }>(`${control}/requests`);
    const [{ id } = { id: '' }] = await list(inbox);
    const recipients = ['ida@example.org'];
    expect(requests).toMatchObject([
      { stage: 'connect', result: 'accepted' },
      { stage: 'rcpt', recipients, result: 'refused', fault: 'reject' },
      { stage: 'connect', result: 'accepted' },
      { stage: 'rcpt', recipients, result: 'accepted' },
      { stage: 'data', recipients, result: 'accepted', message: id },
    ]);
  });
});

describe('the command', () => {
  const script = 'fakes/mail-catcher/serve.ts';

  it('keeps its messages over a kill and ends well on SIGTERM', async () => {
    const own = await temporaryFolder();
    onTestFinished(own.remove);
    const flags = ['--port', '0', '--http-port', '0', '--control-port', '0', '--data', own.path];
    const ports = (ready: string) => {
      const match = /smtp:\/\/127\.0\.0\.1:(\d+) inbox (http:\S+) control http/.exec(ready);
      return { smtp: Number(match?.[1]), inbox: match?.[2] ?? '' };
    };
    const first = await command(script, flags);
    await send(ports(first.ready).smtp, { subject: 'kept', text: 'x' });
    await end(first.child, 'SIGKILL');
    const second = await command(script, flags);
    const messages = await list(ports(second.ready).inbox);
    expect(messages.map(({ subject }) => subject)).toEqual(['kept']);
    expect(await end(second.child, 'SIGTERM')).toBe(0);
  });

  it('says which port is taken', () => {
    const { code, printed } = refusedStart(script, [
      ...['--port', String(mail.port), '--http-port', '0', '--control-port', '0'],
      ...['--data', `${folder.path}/other`],
    ]);
    expect(code).toBe(2);
    expect(printed).toContain(String(mail.port));
  });
});
