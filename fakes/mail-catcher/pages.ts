import { html, Html } from './html';
import { textToHtml } from './message-html';
import type { MessageSummary } from './message-store';
import type { ReadMail } from './parse';

/** Messages on one page of the list. */
export const pageSize = 50;

/** Characters of a source shown in the page; the whole can be downloaded. */
const sourceShown = 200_000;

export const views = ['html', 'text', 'source'] as const;
export type View = (typeof views)[number];
const viewNames: Record<View, string> = { html: 'HTML', text: 'Text', source: 'Source' };

const time = (iso: string) => `${iso.slice(0, 10)} ${iso.slice(11, 19)} UTC`;

function bytes(size: number): string {
  if (size < 1024) return `${size} B`;
  if (size < 1024 * 1024) return `${(size / 1024).toFixed(1)} kB`;
  return `${(size / 1024 / 1024).toFixed(1)} MB`;
}

function frame(title: string, content: Html): string {
  return html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <title>${title}</title>
        <link rel="stylesheet" href="/inbox.css" />
        <link rel="icon" href="data:," />
      </head>
      <body>
        <header>
          <a href="/">Caught mail</a>
          <p>Nothing here has left this machine.</p>
        </header>
        <main>${content}</main>
      </body>
    </html>`.text;
}

function row(message: MessageSummary): Html {
  return html`<tr>
    <td data-label="Received">
      <time datetime="${message.receivedAt}">${time(message.receivedAt)}</time>
    </td>
    <td data-label="To">${message.recipients.join(', ')}</td>
    <td data-label="Subject">
      <a href="/messages/${message.id}">${message.subject || '(no subject)'}</a>
    </td>
    <td data-label="Files" class="number">${message.attachments}</td>
    <td data-label="Size" class="number">${bytes(message.size)}</td>
  </tr>`;
}

function list(messages: readonly MessageSummary[]): Html {
  return html`<table>
    <thead>
      <tr>
        <th scope="col">Received</th>
        <th scope="col">To</th>
        <th scope="col">Subject</th>
        <th scope="col" class="number">Files</th>
        <th scope="col" class="number">Size</th>
      </tr>
    </thead>
    <tbody>
      ${messages.map(row)}
    </tbody>
  </table>`;
}

function pager(page: number, total: number, to: string): Html {
  const last = Math.max(1, Math.ceil(total / pageSize));
  const link = (target: number, text: string) =>
    target < 1 || target > last
      ? html``
      : html`<a href="/?page=${target}&to=${encodeURIComponent(to)}">${text}</a>`;
  return last === 1
    ? html``
    : html`<nav aria-label="Pages">
        ${link(page - 1, 'Newer')} <span>Page ${page} of ${last}</span> ${link(page + 1, 'Older')}
      </nav>`;
}

/** The inbox: newest first, `page` from 1, `to` the recipient searched for or empty. */
export function inboxPage(messages: readonly MessageSummary[], page: number, to: string): string {
  const shown = messages.slice((page - 1) * pageSize, page * pageSize);
  const none =
    to === ''
      ? html`<p>No mail yet. What the shop sends appears here.</p>`
      : html`<p>No mail to ${to}. <a href="/">Show all</a></p>`;
  return frame(
    'Caught mail',
    html`<h1>Inbox</h1>
      <form method="get" action="/" class="search">
        <label for="to">To</label>
        <input id="to" name="to" type="text" inputmode="email" value="${to}" maxlength="320" />
        <button>Show</button>
        <a href="/?to=${encodeURIComponent(to)}">Look again</a>
      </form>
      ${shown.length === 0 ? none : list(shown)} ${pager(page, messages.length, to)}
      <details>
        <summary>Delete all mail</summary>
        <form method="post" action="/delete"><button>Delete it for good</button></form>
      </details>`,
  );
}

function facts(message: MessageSummary, mail: ReadMail): Html {
  const rows: Array<[string, string]> = [
    ['From', mail.from],
    ['To', mail.to],
    ['Cc', mail.cc],
    ['Reply to', mail.replyTo],
    ['Envelope', `${message.mailFrom || '(empty)'} to ${message.recipients.join(', ')}`],
    ['Received', time(message.receivedAt)],
    ['Size', bytes(message.size)],
  ];
  return html`<dl>
    ${rows
      .filter(([, value]) => value !== '')
      .map(
        ([name, value]) =>
          html`<div>
            <dt>${name}</dt>
            <dd>${value}</dd>
          </div>`,
      )}
  </dl>`;
}

function body(message: MessageSummary, mail: ReadMail, view: View, source: Buffer): Html {
  if (view === 'source') {
    return html`<pre tabindex="0">${source.toString('utf8').slice(0, sourceShown)}</pre>
      <p><a href="/messages/${message.id}/source">Download the source</a></p>`;
  }
  if (view === 'text') {
    return mail.text === undefined
      ? html`<p>This message has no text part.</p>`
      : html`<pre tabindex="0">${textToHtml(mail.text)}</pre>`;
  }
  return mail.html === undefined
    ? html`<p>This message has no HTML part.</p>`
    : html`<iframe
        title="The message"
        src="/messages/${message.id}/html"
        sandbox="allow-popups allow-popups-to-escape-sandbox"
      ></iframe>`;
}

/** One message in one of its views. */
export function messagePage(
  message: MessageSummary,
  mail: ReadMail,
  view: View,
  source: Buffer,
): string {
  const files = mail.attachments.map(
    ({ filename, contentType, content }, index) =>
      html`<li>
        <a href="/messages/${message.id}/files/${index}" download>${filename}</a>
        <span>${contentType}, ${bytes(content.length)}</span>
      </li>`,
  );
  const tabs = views.map((each) =>
    each === view
      ? html`<a href="?view=${each}" aria-current="page">${viewNames[each]}</a>`
      : html`<a href="?view=${each}">${viewNames[each]}</a>`,
  );
  const subject = message.subject || '(no subject)';
  return frame(
    subject,
    html`<p><a href="/">All mail</a></p>
      <h1>${subject}</h1>
      ${facts(message, mail)}
      <nav aria-label="Views" class="views">${tabs}</nav>
      ${body(message, mail, view, source)}
      ${
        files.length === 0
          ? html``
          : html`<h2>Files</h2>
              <ul>
                ${files}
              </ul>`
      }`,
  );
}
