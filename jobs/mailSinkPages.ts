/** The pages of the mail sink: the list, one mail, its HTML in a frame that runs nothing, and JSON for tests. */
import type { IncomingMessage, ServerResponse } from 'node:http';

export interface SunkMail {
  readonly id: number;
  readonly receivedAt: string;
  readonly envelope: { readonly from: string; readonly to: readonly string[] };
  readonly messageId: string;
  readonly subject: string;
  readonly to: readonly string[];
  /** Header name in lower case → the whole line as received. */
  readonly headers: Readonly<Record<string, string>>;
  readonly text: string;
  readonly html: string;
}

const PAGE_POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'";
const MAIL_POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'; sandbox allow-popups allow-popups-to-escape-sandbox";

const STYLE = `body { font: 16px/1.5 system-ui, sans-serif; margin: 2rem auto; max-width: 60rem; padding: 0 1rem; }
table { border-collapse: collapse; width: 100%; } th, td { text-align: left; padding: .4rem .6rem; border-bottom: 1px solid #bbb; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; } iframe { width: 100%; height: 70vh; border: 1px solid #bbb; }`;

export function answerSinkPage(
  mails: readonly SunkMail[],
  request: IncomingMessage,
  response: ServerResponse,
): void {
  const answer = (status: number, type: string, body: string, policy = PAGE_POLICY): void => {
    response.writeHead(status, {
      'content-type': `${type}; charset=utf-8`,
      'content-security-policy': policy,
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'no-referrer',
      'cross-origin-resource-policy': 'same-origin',
      'cache-control': 'no-store',
    });
    response.end(request.method === 'HEAD' ? undefined : body);
  };
  // Only this machine's own names: a page elsewhere must not read mail by pointing its name here.
  if (!/^(127\.0\.0\.1|localhost)(:\d+)?$/.test(request.headers.host ?? ''))
    return answer(403, 'text/plain', 'Open this page by 127.0.0.1 or localhost.');
  if (request.method !== 'GET' && request.method !== 'HEAD')
    return answer(405, 'text/plain', 'This page is read only.');
  const path = request.url ?? '/';
  if (path === '/') return answer(200, 'text/html', listPage(mails));
  if (path === '/messages.json') return answer(200, 'application/json', JSON.stringify(mails));
  const [, id, part] = /^\/messages\/(\d+)(\/html)?$/.exec(path) ?? [];
  const mail = mails.find((one) => String(one.id) === id);
  if (!mail) return answer(404, 'text/plain', 'There is no such mail.');
  if (part) return answer(200, 'text/html', `<base target="_blank">${mail.html}`, MAIL_POLICY);
  return answer(200, 'text/html', mailPage(mail));
}

const escaped = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');

const withLinks = (text: string): string =>
  text
    .split(/(https?:\/\/[^\s<>"]+)/)
    .map((part, index) =>
      index % 2 === 1
        ? `<a href="${escaped(part)}" rel="noreferrer" target="_blank">${escaped(part)}</a>`
        : escaped(part),
    )
    .join('');

const page = (title: string, body: string): string =>
  `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escaped(title)}</title><style>${STYLE}</style></head><body><main>${body}</main></body></html>`;

function listPage(mails: readonly SunkMail[]): string {
  const rows = [...mails]
    .reverse()
    .map(
      (mail) =>
        `<tr><td>${escaped(mail.receivedAt)}</td><td>${escaped(mail.envelope.to.join(', '))}</td><td><a href="/messages/${mail.id}">${escaped(mail.subject || '(no subject)')}</a></td></tr>`,
    );
  const table = `<table><caption>Newest first</caption><thead><tr><th scope="col">Received (UTC)</th><th scope="col">To</th><th scope="col">Subject</th></tr></thead><tbody>${rows.join('')}</tbody></table>`;
  return page(
    'Mail sink',
    `<h1>Mail sink</h1><p>Mail that Underkeel would have sent. Nothing leaves this machine.</p>${rows.length > 0 ? table : '<p>No mail yet.</p>'}`,
  );
}

const mailPage = (mail: SunkMail): string =>
  page(
    mail.subject,
    `<p><a href="/">All mail</a></p><h1>${escaped(mail.subject)}</h1>
<p>To ${escaped(mail.envelope.to.join(', '))}, received ${escaped(mail.receivedAt)}</p>
<h2>Text</h2><pre>${withLinks(mail.text)}</pre>
${mail.html ? `<h2>HTML</h2><iframe sandbox="allow-popups allow-popups-to-escape-sandbox" title="The mail as HTML" src="/messages/${mail.id}/html"></iframe>` : ''}`,
  );
