import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import { Refused, sendJson } from '../shared/json-http';
import { isForeign } from '../shared/loopback';
import { readAsset } from './assets';
import { messagePolicy, prepareMessageHtml } from './message-html';
import type { MessageStore, MessageSummary } from './message-store';
import { inboxPage, messagePage, pageSize, views } from './pages';
import { readMail } from './parse';

const pagePolicy =
  "default-src 'none'; style-src 'self'; font-src 'self'; img-src data:; frame-src 'self'; " +
  "form-action 'self'; base-uri 'none'; frame-ancestors 'none'";
const filePolicy = "default-src 'none'; sandbox";

function send(
  response: ServerResponse,
  type: string,
  body: string | Buffer,
  policy: string,
  more: Record<string, string> = {},
): void {
  const data = Buffer.from(body);
  response.writeHead(200, {
    'content-type': type,
    'content-length': data.length,
    'content-security-policy': policy,
    'x-content-type-options': 'nosniff',
    'referrer-policy': 'same-origin',
    'cache-control': 'no-store',
    ...more,
  });
  response.end(data);
}

/** A download's name: plain ASCII for old clients, the true one percent-encoded (RFC 6266). */
function disposition(filename: string): string {
  const plain = filename.replace(/[^A-Za-z0-9._ -]/g, '_');
  const encoded = encodeURIComponent(filename.toWellFormed()).replace(/['()*]/g, '_');
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}

/** Names carry no path and no line of their own. */
const safeName = (name: string) => name.replace(/[/\\\u0000-\u001f\u007f]/g, '_').slice(0, 200);

type Handle = (
  messages: MessageStore,
  response: ServerResponse,
  url: URL,
  message: MessageSummary,
  part: string,
) => Promise<void> | void;

async function showMessage(
  messages: MessageStore,
  response: ServerResponse,
  url: URL,
  message: MessageSummary,
): Promise<void> {
  const source = await messages.source(message);
  const mail = await readMail(source);
  const asked = url.searchParams.get('view');
  const view = views.find((each) => each === asked) ?? (mail.html === undefined ? 'text' : 'html');
  send(response, 'text/html; charset=utf-8', messagePage(message, mail, view, source), pagePolicy);
}

async function apiMessage(
  messages: MessageStore,
  response: ServerResponse,
  _: URL,
  message: MessageSummary,
): Promise<void> {
  const mail = await readMail(await messages.source(message));
  const attachments = mail.attachments.map(({ filename, contentType, content }, index) => ({
    filename,
    contentType,
    size: content.length,
    path: `/messages/${message.id}/files/${index}`,
  }));
  sendJson(response, 200, { ...message, ...mail, attachments });
}

/** What can be asked of one message, by the path around its id. */
const ofMessage: ReadonlyArray<readonly [RegExp, Handle]> = [
  [/^\/messages\/([\w-]+)$/, showMessage],
  [/^\/api\/messages\/([\w-]+)$/, apiMessage],
  [
    /^\/messages\/([\w-]+)\/html$/,
    async (messages, response, _, message) => {
      const { html } = await readMail(await messages.source(message));
      if (html === undefined) throw new Refused(404, 'This message has no HTML part.');
      send(response, 'text/html; charset=utf-8', prepareMessageHtml(html), messagePolicy);
    },
  ],
  [
    /^\/messages\/([\w-]+)\/source$/,
    async (messages, response, _, message) => {
      const name = { 'content-disposition': disposition(`${message.id}.eml`) };
      send(response, 'message/rfc822', await messages.source(message), filePolicy, name);
    },
  ],
  [
    /^\/messages\/([\w-]+)\/files\/(\d{1,4})$/,
    async (messages, response, _, message, part) => {
      const file = (await readMail(await messages.source(message))).attachments[Number(part)];
      if (file === undefined) throw new Refused(404, 'There is no such file.');
      const name = { 'content-disposition': disposition(safeName(file.filename)) };
      send(response, 'application/octet-stream', file.content, filePolicy, name);
    },
  ],
];

async function handle(
  messages: MessageStore,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  if (isForeign(request)) throw new Refused(403, 'This inbox answers this machine only.');
  const path = request.url ?? '/';
  if (!URL.canParse(path, 'http://inbox')) throw new Refused(400, 'The address is malformed.');
  const url = new URL(path, 'http://inbox');
  const verb = `${request.method === 'HEAD' ? 'GET' : request.method} ${url.pathname}`;
  const to = (url.searchParams.get('to') ?? '').slice(0, 320).trim();
  if (verb === 'GET /') {
    const found = messages.list(to === '' ? undefined : to);
    const last = Math.max(1, Math.ceil(found.length / pageSize));
    const page = Math.min(last, Math.max(1, Math.trunc(Number(url.searchParams.get('page'))) || 1));
    send(response, 'text/html; charset=utf-8', inboxPage(found, page, to), pagePolicy);
  } else if (verb === 'GET /api/messages') {
    sendJson(response, 200, { messages: messages.list(to === '' ? undefined : to) });
  } else if (verb === 'DELETE /api/messages') {
    sendJson(response, 200, { removed: await messages.clear() });
  } else if (verb === 'POST /delete') {
    await messages.clear();
    response.writeHead(303, { location: '/', 'content-length': 0 }).end();
  } else if (verb.startsWith('GET ')) {
    await handleGet(messages, response, url);
  } else {
    throw new Refused(405, 'This method is not known here.');
  }
}

async function handleGet(
  messages: MessageStore,
  response: ServerResponse,
  url: URL,
): Promise<void> {
  const asset = await readAsset(url.pathname);
  if (asset !== undefined) {
    send(response, asset.type, asset.body, filePolicy, { 'cache-control': 'max-age=3600' });
    return;
  }
  for (const [pattern, answer] of ofMessage) {
    const match = pattern.exec(url.pathname);
    if (match === null) continue;
    const message = messages.find(match[1] ?? '');
    if (message === undefined) throw new Refused(404, 'There is no such message.');
    await answer(messages, response, url, message, match[2] ?? '');
    return;
  }
  throw new Refused(404, 'There is no such page.');
}

/** The inbox over HTTP: pages for people, JSON for programs. */
export function inboxServer(messages: MessageStore): Server {
  return createServer((request, response) => {
    handle(messages, request, response).catch((error: unknown) => {
      if (!(error instanceof Refused)) console.error(error);
      if (response.headersSent) response.destroy();
      else if (error instanceof Refused) sendJson(response, error.status, { error: error.message });
      else sendJson(response, 500, { error: 'the inbox failed' });
    });
  });
}
