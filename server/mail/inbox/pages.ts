import { escapeHtml } from '../templates/renderHtml';
import type { InboxMessage } from './store';
import { styleSheet } from './style';

/** The list of messages, newest first. */
export function listPage(messages: readonly InboxMessage[]): string {
  const heading = messages.length === 0 ? 'No mail yet' : messages.length === 1 ? 'One mail' : `${messages.length} mails`;
  const list = messages.length === 0
    ? '<p class="quiet">Mail that the school would send arrives here instead: invitations, receipts, verdicts. Do something in the app, then look again.</p>'
    : `<ol class="list" reversed>${messages.map((message) => listItem(message, false)).join('')}</ol>`;
  return page(heading, `<main id="main"><h1>${heading}</h1>${list}<p><a class="button" href="/">Look again</a></p></main>`);
}

/** One message beside the list it stands in. */
export function messagePage(message: InboxMessage, messages: readonly InboxMessage[]): string {
  const frame = message.html === '' ? '' : `<iframe title="The mail as a mail program shows it" src="/messages/${message.id}/html" sandbox="allow-popups allow-popups-to-escape-sandbox" referrerpolicy="no-referrer"></iframe>`;
  return page(message.subject, `<div class="panes">
<nav aria-label="All mail"><p><a href="/">All mail</a></p><ol class="list" reversed>${messages.map((other) => listItem(other, other.id === message.id)).join('')}</ol></nav>
<main id="main"><h1>${escapeHtml(message.subject)}</h1>
<dl><dt>To</dt><dd>${escapeHtml(message.to.join(', '))}</dd><dt>From</dt><dd>${escapeHtml(message.from)}</dd><dt>Received</dt><dd>${timeTag(message.receivedAt)}</dd></dl>
${frame}
<details${frame === '' ? ' open' : ''}><summary>Plain text part</summary><pre>${linked(message.text)}</pre></details>
</main></div>`);
}

export function notFoundPage(): string {
  return page('No such mail', '<main id="main"><h1>No such mail</h1><p>Only the newest mails are kept. <a href="/">See all mail</a>.</p></main>');
}

/** The HTML part made ready for its frame: links open in a tab of their own. */
export function frameDocument(message: InboxMessage): string {
  return message.html.replace(/<head>/i, '<head><base target="_blank">');
}

function listItem(message: InboxMessage, current: boolean): string {
  return `<li><a href="/messages/${message.id}"${current ? ' aria-current="page"' : ''}><strong>${escapeHtml(message.subject)}</strong>` +
    `<span class="quiet">to ${escapeHtml(message.to.join(', '))}, ${timeTag(message.receivedAt)}</span></a></li>`;
}

function timeTag(iso: string): string {
  return `<time datetime="${escapeHtml(iso)}">${escapeHtml(iso.slice(0, 16).replace('T', ' '))} UTC</time>`;
}

/** Escaped text in which web addresses can be followed. */
function linked(text: string): string {
  return text.split(/(https?:\/\/[^\s<>"']+)/g)
    .map((part, index) => (index % 2 === 1 ? `<a href="${escapeHtml(part)}" target="_blank" rel="noopener noreferrer">${escapeHtml(part)}</a>` : escapeHtml(part)))
    .join('');
}

function page(title: string, body: string): string {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<title>${escapeHtml(title)} · Trayward local inbox</title>
<style>${styleSheet}</style>
</head>
<body>
<a class="skip" href="#main">Skip to the mail</a>
<header><p class="name">Trayward <span class="quiet">local inbox</span></p><div class="series" aria-hidden="true"></div></header>
${body}
</body>
</html>
`;
}
