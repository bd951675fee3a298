import { once } from 'node:events';
import { connect } from 'node:net';
import { afterAll, beforeAll, beforeEach, describe, expect, it, onTestFinished } from 'vitest';
import { startMailCatcher, type MailCatcher } from '../../fakes/mail-catcher/server';
import { json, raw, temporaryFolder } from './fakes-client';
import { list, replyTo, send, type Message } from './fakes-mail-client';

let mail: MailCatcher;
let folder: Awaited<ReturnType<typeof temporaryFolder>>;
let inbox: string;

beforeAll(async () => {
  folder = await temporaryFolder();
  mail = await startMailCatcher({ data: folder.path, maxMessageBytes: 100_000, maxMessages: 60 });
  inbox = `http://127.0.0.1:${mail.httpPort}`;
});
afterAll(async () => {
  await mail.close();
  await folder.remove();
});
beforeEach(async () => {
  await json(`${inbox}/api/messages`, 'DELETE');
});

const only = async (): Promise<Message> => {
  const [first, ...more] = await list(inbox);
  expect(more).toEqual([]);
  return json<Message>(`${inbox}/api/messages/${first?.id}`);
};
const page = async (path: string) => {
  const answer = await fetch(inbox + path);
  return {
    answer,
    text: await answer.text(),
    policy: answer.headers.get('content-security-policy'),
  };
};

describe('mail caught', () => {
  it('is told as it was sent, with its links', async () => {
    const html =
      '<p>Your meter: <a href="http://127.0.0.1:4321/t/1?a=1&amp;b=2">look</a> <a href="mailto:x@example.org">write</a></p>';
    const text = 'Dear Ida,\nsee http://127.0.0.1:4321/t/1?a=1&b=2. Thank you.\n';
    await send(mail.port, { subject: 'Arrived: 4M7 Ω', text, html, cc: 'cee@example.org' });
    const message = await only();
    expect(message).toMatchObject({
      mailFrom: 'desk@harrow-lane.example',
      recipients: ['ida@example.org', 'cee@example.org'],
      from: '"Harrow Lane Instruments" <desk@harrow-lane.example>',
      to: 'ida@example.org',
      subject: 'Arrived: 4M7 Ω',
      html,
      links: ['http://127.0.0.1:4321/t/1?a=1&b=2'],
    });
    expect(message.text?.trim()).toBe(text.trim());
    expect(message.headers.map(({ name }) => name)).toContain('Message-ID');
  });

  it('has no HTML when only text was sent, and no text when only HTML', async () => {
    await send(mail.port, { subject: 'plain', text: 'only text' });
    expect((await only()).html).toBeUndefined();
    await json(`${inbox}/api/messages`, 'DELETE');
    await send(mail.port, { subject: 'rich', html: '<p>only html</p>' });
    expect((await only()).text).toBeUndefined();
  });

  it('is found by each envelope recipient whatever the case, newest first', async () => {
    await send(mail.port, { subject: 'one', to: ['a@example.org', 'b@example.org'], text: 'x' });
    await send(mail.port, { subject: 'two', to: 'x@example.org', bcc: 'B@example.org', text: 'x' });
    const subjects = async (to?: string) => (await list(inbox, to)).map(({ subject }) => subject);
    expect(await subjects('b@EXAMPLE.org')).toEqual(['two', 'one']);
    expect(await subjects('a@example.org')).toEqual(['one']);
    expect(await subjects('example.org')).toEqual([]);
    expect(await subjects()).toEqual(['two', 'one']);
  });

  it('gives attachments back byte for byte, always as a download', async () => {
    const content = Buffer.from(Array.from({ length: 5000 }, (_, index) => index % 256));
    const attachments = [{ filename: 'Bericht µ.html', content, contentType: 'text/html' }];
    await send(mail.port, { subject: 'report', text: 'x', attachments });
    const [file] = (await only()).attachments;
    expect(file).toMatchObject({
      filename: 'Bericht µ.html',
      contentType: 'text/html',
      size: 5000,
    });
    const answer = await fetch(inbox + file?.path);
    expect(Buffer.from(await answer.arrayBuffer()).equals(content)).toBe(true);
    expect(answer.headers.get('content-type')).toBe('application/octet-stream');
    expect(answer.headers.get('content-disposition')).toBe(
      `attachment; filename="Bericht _.html"; filename*=UTF-8''Bericht%20%C2%B5.html`,
    );
    expect(answer.headers.get('content-security-policy')).toContain('sandbox');
  });

  it('over the size limit is refused for good', async () => {
    expect(await replyTo(mail.port, { text: 'x'.repeat(120_000) })).toBe(552);
    expect(await list(inbox)).toEqual([]);
  });

  it('over the size limit is refused too when the client does not say its size', async () => {
    const socket = connect(mail.port, '127.0.0.1');
    onTestFinished(() => void socket.destroy());
    const replies: string[] = [];
    socket.on('data', (data: Buffer) => replies.push(data.toString('latin1')));
    await once(socket, 'data');
    for (const line of [
      'HELO bench',
      'MAIL FROM:<a@example.org>',
      'RCPT TO:<b@example.org>',
      'DATA',
    ]) {
      socket.write(`${line}\r\n`);
      await once(socket, 'data');
    }
    socket.write(`Subject: big\r\n\r\n${`${'x'.repeat(70)}\r\n`.repeat(2000)}.\r\n`);
    await once(socket, 'data');
    expect(replies.at(-1)).toMatch(/^552 /);
    expect(await list(inbox)).toEqual([]);
  });

  it('beyond the number kept pushes the oldest out', async () => {
    const numbers = Array.from({ length: 62 }, (_, index) => index);
    await send(mail.port, ...numbers.map((n) => ({ subject: `n${n}`, text: 'x' })));
    const subjects = (await list(inbox)).map(({ subject }) => subject);
    expect(subjects).toHaveLength(60);
    expect(subjects.at(-1)).toBe('n2');
    const second = await page('/?page=2');
    expect(second.text).toContain('n2</a>');
    expect(second.text).not.toContain('n61</a>');
  });
});

describe('the inbox for people', () => {
  it('shows hostile subjects, names and addresses as text', async () => {
    const evil = '<script>alert("1")</script>';
    await send(mail.port, {
      subject: evil,
      from: { name: evil, address: 'eve@example.org' },
      text: `${evil} http://x.example/"onmouseover="alert(1)`,
      attachments: [{ filename: '"><img src=x>\r\nSet-Cookie: a=b.txt', content: 'x' }],
    });
    const { id, attachments } = await only();
    for (const path of ['/', `/messages/${id}`, `/messages/${id}?view=source`]) {
      const { text, policy } = await page(path);
      expect(text).toContain('&lt;script&gt;');
      expect(text).not.toContain('<script');
      expect(text).not.toContain('<img');
      expect(text).not.toMatch(/\sonmouseover="/);
      expect(policy).toContain("default-src 'none'");
      expect(policy).not.toContain('unsafe');
    }
    const file = await fetch(inbox + attachments[0]?.path);
    expect(file.headers.get('set-cookie')).toBeNull();
    expect(file.headers.get('content-disposition')).not.toMatch(/[<>\r\n]|Set-Cookie: /);
  });

  it('shows HTML in a frame without scripts or outside requests, its links opening new windows', async () => {
    const html =
      '<a href="https://shop.example/t" target="_self" onclick="x()">a</a>' +
      '<A HREF=javascript:alert(1)>b</A><a href=" &#106;avascript:alert(1)">c</a>' +
      '<a title="1 > 0" href="mailto:a@example.org">d</a><img src="http://evil.example/p.png">';
    await send(mail.port, { subject: 'rich', html });
    const { id } = await only();
    const outer = await page(`/messages/${id}`);
    expect(outer.text).toMatch(/<iframe[^>]*sandbox="allow-popups allow-popups-to-escape-sandbox"/);
    const { text, policy } = await page(`/messages/${id}/html`);
    expect(policy).toMatch(/^default-src 'none'; img-src data:;/);
    expect(policy).toMatch(/sandbox allow-popups allow-popups-to-escape-sandbox$/);
    const links = text.match(/<a [^]*?<\/a>/gi);
    const end = 'target="_blank" rel="noopener noreferrer">';
    expect(links).toEqual([
      `<a href="https://shop.example/t" onclick="x()" ${end}a</a>`,
      `<a ${end}b</A>`,
      `<a ${end}c</a>`,
      `<a title="1 > 0" href="mailto:a@example.org" ${end}d</a>`,
    ]);
  });

  it('shows text with its web addresses as links', async () => {
    await send(mail.port, {
      subject: 'plain',
      text: 'Approve (http://127.0.0.1:4321/e?a=1&b=2), please.',
    });
    const { id } = await only();
    const { text } = await page(`/messages/${id}`);
    const address = 'http://127.0.0.1:4321/e?a=1&amp;b=2';
    expect(text).toContain(
      `(<a href="${address}" target="_blank" rel="noopener noreferrer">${address}</a>), please.`,
    );
    const source = await page(`/messages/${id}/source`);
    expect(source.answer.headers.get('content-type')).toBe('message/rfc822');
    expect(source.text).toMatch(/^Received|^From: /m);
  });

  it('needs no script and serves its own style and fonts', async () => {
    const { text } = await page('/');
    expect(text).not.toContain('<script');
    expect([...text.matchAll(/(?:src|href)="(https?:|\/\/)/g)]).toEqual([]);
    expect((await page('/inbox.css')).answer.headers.get('content-type')).toContain('text/css');
    expect((await fetch(`${inbox}/fonts/sans-400.woff2`)).status).toBe(200);
  });

  it('is emptied by its own button only', async () => {
    await send(mail.port, { subject: 's', text: 't' });
    const host = `127.0.0.1:${mail.httpPort}`;
    const press = (headers: Record<string, string>) =>
      raw(mail.httpPort, 'POST', '/delete', headers).then(({ status }) => status);
    expect(await press({ host, origin: 'http://elsewhere.example' })).toBe(403);
    expect(await press({ host, origin: 'null' })).toBe(403);
    expect(await list(inbox)).toHaveLength(1);
    expect(await press({ host, origin: `http://${host}` })).toBe(303);
    expect(await list(inbox)).toEqual([]);
  });

  it('answers nobody under a foreign name and nothing outside its messages', async () => {
    const foreign = await raw(mail.httpPort, 'GET', '/api/messages', { host: 'shop.example' });
    expect(foreign.status).toBe(403);
    for (const path of [
      '/messages/..%2f..%2fetc',
      '/messages/../../etc/passwd',
      '/nothing',
      '//[',
    ]) {
      const { status } = await raw(mail.httpPort, 'GET', path, { host: '127.0.0.1' });
      expect([400, 404]).toContain(status);
    }
  });
});
