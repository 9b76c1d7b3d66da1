import { escapeHtml } from '../escape-html';
import type { ReadMessage } from './read-message';

const style = `
:root{color-scheme:light;font:17px/1.5 system-ui,sans-serif;color:#222831;background:#f2f4f7}
body{margin:0}header{background:#fdf3c7;color:#4a3b00;padding:.6rem 1rem;text-align:center}
main{max-width:60rem;margin:1.5rem auto;padding:0 1rem}h1{font-size:1.5rem}h2{font-size:1.15rem}
table{border-collapse:collapse;width:100%;background:#fff}th,td{text-align:left;padding:.6rem;border-bottom:1px solid #d5dae1;vertical-align:top;overflow-wrap:anywhere}
a{color:#174a8c}:focus-visible{outline:3px solid #174a8c;outline-offset:2px}
iframe{width:100%;height:36rem;border:1px solid #7a8594;background:#fff}
pre{white-space:pre-wrap;overflow-wrap:anywhere;background:#fff;border:1px solid #d5dae1;padding:1rem}
dt{font-weight:700}dd{margin:0 0 .5rem;overflow-wrap:anywhere}
.list{display:flex;justify-content:space-between;align-items:baseline;gap:1rem;flex-wrap:wrap}`;

function document(title: string, body: string): string {
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1">
<title>${escapeHtml(title)}</title><style>${style}</style></head>
<body><header>Local mail catcher. Messages stay on this machine.</header><main>${body}</main></body>
</html>`;
}

/**
 * The list, newest first.
 * @param total how many there are, of which some may not be listed
 */
export function listPage(messages: readonly ReadMessage[], total: number): string {
  const rows = messages
    .map(
      (message) =>
        `<tr><td><a href="/messages/${message.id}">${
          escapeHtml(message.subject) || 'No subject'
        }</a></td><td dir="auto">${escapeHtml(message.envelope.recipients.join(', '))}</td><td>${when(message)}</td></tr>`,
    )
    .join('\n');
  const table = `<table><thead><tr><th scope="col">Subject</th><th scope="col">To</th><th scope="col">Received</th></tr></thead><tbody>
${rows}</tbody></table>`;
  const count = total === 1 ? '1 message' : `${total} messages`;
  const listed = total > messages.length ? `, the newest ${messages.length} listed` : '';
  return document(
    `Caught mail: ${count}`,
    `<div class="list"><h1>Caught mail</h1><p>${count}${listed}, newest first · <a href="/">Look again</a></p></div>
${messages.length === 0 ? '<p>Nothing has been sent yet. What Plimsoll sends appears here.</p>' : table}`,
  );
}

/** One message: as a mail program shows it, as text, and as it came. */
export function messagePage(message: ReadMessage, raw: string): string {
  const { subject, html, text } = message;
  const shown = subject || 'No subject';
  return document(
    `${shown}: caught mail`,
    `<p><a href="/">All caught mail</a></p><h1 dir="auto">${escapeHtml(shown)}</h1>
<dl><dt>From</dt><dd dir="auto">${escapeHtml(message.from)}</dd><dt>To</dt><dd dir="auto">${escapeHtml(message.to.join(', '))}</dd>
<dt>Received</dt><dd>${when(message)}</dd><dt>Message-ID</dt><dd>${escapeHtml(message.messageId ?? 'None')}</dd></dl>
<h2>As shown</h2>
${html === null ? '<p>This message has no HTML part.</p>' : frame(html)}
<h2>As text</h2><pre dir="auto">${escapeHtml(text)}</pre>
<h2>As it came</h2><details><summary>Source</summary><pre>${escapeHtml(raw)}</pre></details>`,
  );
}

/** Without scripts and without this page's origin; its links open a tab of their own. */
function frame(html: string): string {
  const linksApart = html.replace(/<head(\s[^>]*)?>/i, '$&<base target="_blank">');
  return `<iframe title="The message as shown" sandbox="allow-popups allow-popups-to-escape-sandbox" srcdoc="${escapeHtml(linksApart)}"></iframe>`;
}

const when = ({ receivedAt }: ReadMessage): string =>
  `<time datetime="${receivedAt}">${receivedAt.slice(0, 19).replace('T', ' ')} UTC</time>`;

export function notFoundPage(): string {
  return document(
    'No such message',
    '<h1>No such message</h1><p><a href="/">All caught mail</a></p>',
  );
}
