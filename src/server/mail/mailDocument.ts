/** A mail as a list of parts, from which both of its forms are made: what one says the other says. */

/** The day's colours: mail readers do not follow the product's switch. */
const INK = '#12283C';
const QUIET = '#4C5D6C';
const PAPER = '#F6F1E3';
const SHEET = '#FFFDF8';
const HAIR = '#CFC6AD';
const WARNING = '#A2145F';

export type MailPart =
  | { readonly part: 'title'; readonly text: string }
  | { readonly part: 'heading'; readonly text: string }
  | { readonly part: 'paragraph'; readonly text: string }
  | { readonly part: 'quiet'; readonly text: string }
  | { readonly part: 'link'; readonly label: string; readonly url: string }
  | {
      readonly part: 'item';
      readonly title: string;
      /** A word beside the title; a warning stands in the one warning colour. */
      readonly mark: { readonly text: string; readonly isWarning: boolean };
      readonly lines: readonly string[];
      readonly link: { readonly label: string; readonly url: string };
    };

export interface RenderedMail {
  readonly text: string;
  readonly html: string;
}

export function renderMail(title: string, parts: readonly MailPart[]): RenderedMail {
  const rows = parts.map((part) => `<tr><td style="padding:0 16px">${htmlOf(part)}</td></tr>`).join('\n');
  return {
    text: `${parts.map(textOf).join('\n\n')}\n`,
    html: `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light"><title>${escapeHtml(title)}</title></head>
<body style="margin:0;padding:16px 8px;background:${PAPER};color:${INK};font:14px/1.5 system-ui,-apple-system,'Segoe UI',Roboto,sans-serif">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" border="0" style="max-width:640px;margin:0 auto;background:${SHEET};border:3px double ${INK}">
<tr><td style="height:12px"></td></tr>
${rows}
<tr><td style="height:12px"></td></tr>
</table></body></html>
`,
  };
}

const escapeHtml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');

function textOf(part: MailPart): string {
  switch (part.part) {
    case 'link':
      return `${part.label}: ${part.url}`;
    case 'item':
      return [
        `${part.title} · ${part.mark.text}`,
        ...part.lines.map((line) => `  ${line}`),
        `  ${part.link.label}: ${part.link.url}`,
      ].join('\n');
    case 'title':
    case 'heading':
    case 'paragraph':
    case 'quiet':
      return part.text;
  }
}

function htmlOf(part: MailPart): string {
  const paragraph = (style: string, html: string) => `<p style="margin:6px 0;${style}">${html}</p>`;
  switch (part.part) {
    case 'title':
      return `<h1 style="margin:4px 0 8px;font-size:20px;font-weight:600">${escapeHtml(part.text)}</h1>`;
    case 'heading':
      return `<h2 style="margin:16px 0 4px;padding-bottom:4px;font-size:16px;font-weight:600;border-bottom:1px solid ${HAIR}">${escapeHtml(part.text)}</h2>`;
    case 'paragraph':
      return paragraph('', escapeHtml(part.text));
    case 'quiet':
      return paragraph(`color:${QUIET};font-size:13px`, escapeHtml(part.text));
    case 'link':
      return paragraph('', linkOf(part));
    case 'item': {
      const mark = `<span style="color:${part.mark.isWarning ? WARNING : QUIET}">${escapeHtml(part.mark.text)}</span>`;
      return [
        paragraph('margin-bottom:0;padding-top:6px', `<b>${escapeHtml(part.title)}</b> · ${mark}`),
        ...part.lines.map((line) => paragraph('margin:2px 0', escapeHtml(line))),
        paragraph(`margin-top:2px;padding-bottom:8px;border-bottom:1px solid ${HAIR}`, linkOf(part.link)),
      ].join('\n');
    }
  }
}

const linkOf = ({ label, url }: { readonly label: string; readonly url: string }): string =>
  `<a href="${escapeHtml(url)}" style="color:${INK}">${escapeHtml(label)}</a>`;
