/** The morning's digest of one person: what needs a decision, what is due, what got better. */
import { CAUTIONS } from '../../core/cautions.ts';
import { renderMail, type MailPart, type RenderedMail } from './mailDocument.ts';

/** In the order in which they are read. */
export const DIGEST_BLOCKS = ['New', 'Worse', 'Due today', 'Overdue', 'Improved'] as const;
export type DigestBlockName = (typeof DIGEST_BLOCKS)[number];

export interface DigestItem {
  readonly alertId: number;
  readonly borrowerName: string;
  /** 'limit EUR 12.4m' */
  readonly exposure: string;
  readonly kind: string;
  readonly severity: string;
  readonly isWarning: boolean;
  readonly sentence: string;
  /** '30 Sep 2026' */
  readonly since: string;
  readonly asked: string;
  readonly url: string;
}

export interface Digest {
  readonly deskNames: readonly string[];
  /** '1 Dec 2026' */
  readonly day: string;
  readonly blocks: readonly { readonly name: DigestBlockName; readonly items: readonly DigestItem[] }[];
  readonly stillOverdue: number;
  readonly newFigures: number;
  readonly unchanged: number;
  /** '1 Dec 2026, 03:00 CET' */
  readonly knownAt: string;
  readonly runAt: string;
  readonly tested: number;
  readonly total: number;
  /** Borrowers of the reader that could not be computed, with the reason. */
  readonly failures: readonly string[];
  readonly alertsUrl: string;
  readonly unsubscribeUrl: string;
}

/** More than this nobody reads in the morning; the rest is a count with a link. */
export const MOST_ITEMS = 10;

export function digestMail(digest: Digest): RenderedMail & { readonly subject: string } {
  const subject = subjectOf(digest);
  return {
    subject,
    ...renderMail(subject, [...opening(digest, subject), ...listed(digest), ...closing(digest)]),
  };
}

/** RFC 8058: one click is a POST and needs an https address; over http there is only the link in the text. */
export const oneClickHeaders = (url: string): Readonly<Record<string, string>> =>
  url.startsWith('https:')
    ? { 'List-Unsubscribe': `<${url}>`, 'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click' }
    : {};

const countOf = (digest: Digest, ...names: DigestBlockName[]): number =>
  digest.blocks
    .filter((block) => names.includes(block.name))
    .reduce((count, block) => count + block.items.length, 0);

/** Counts and a day, never a borrower's name: subjects are read on locked screens. */
function subjectOf(digest: Digest): string {
  const decide = countOf(digest, 'New', 'Worse', 'Overdue');
  const due = countOf(digest, 'Due today');
  const improved = countOf(digest, 'Improved');
  const failed = digest.failures.length;
  const counts = [
    ...(decide > 0 ? [`${decide} ${decide === 1 ? 'needs' : 'need'} a decision`] : []),
    ...(due > 0 ? [`${due} due today`] : []),
    ...(decide + due === 0 && improved > 0 ? [`${improved} improved`] : []),
    ...(failed > 0 ? [`${failed} not computed`] : []),
  ];
  return `[${digest.deskNames.join(', ')}] ${counts.join(', ')} - ${digest.day}`;
}

function opening(digest: Digest, subject: string): MailPart[] {
  return [
    { part: 'title', text: subject },
    {
      part: 'quiet',
      text: `Figures known at ${digest.knownAt}. Run at ${digest.runAt}. Tested ${digest.tested} of ${digest.total} borrowers of the book.`,
    },
    ...(digest.failures.length === 0
      ? []
      : [
          {
            part: 'paragraph' as const,
            text: `Could not be computed, so silence says nothing about them: ${digest.failures.join('; ')}.`,
          },
        ]),
  ];
}

function listed(digest: Digest): MailPart[] {
  let left = MOST_ITEMS;
  const parts: MailPart[] = [];
  let rest = 0;
  for (const { name, items } of digest.blocks) {
    if (items.length === 0) continue;
    const shown = items.slice(0, left);
    left -= shown.length;
    rest += items.length - shown.length;
    if (shown.length === 0) continue;
    parts.push({ part: 'heading', text: `${name} (${items.length})` }, ...shown.map(itemOf));
  }
  if (rest > 0)
    parts.push({ part: 'link', label: `${rest} more: open the list of alerts`, url: digest.alertsUrl });
  return parts;
}

const itemOf = (item: DigestItem): MailPart => ({
  part: 'item',
  title: `${item.borrowerName} (${item.exposure})`,
  mark: { text: `${item.kind}, ${item.severity}`, isWarning: item.isWarning },
  lines: [item.sentence, `Since ${item.since}. Asked: ${item.asked}`],
  link: { label: `Open alert ${item.alertId}`, url: item.url },
});

function closing(digest: Digest): MailPart[] {
  const counts = [
    ...(digest.stillOverdue > 0
      ? [`${digest.stillOverdue} ${digest.stillOverdue === 1 ? 'is' : 'are'} overdue from before`]
      : []),
    ...(digest.newFigures > 0
      ? [`${digest.newFigures} ${digest.newFigures === 1 ? 'has' : 'have'} new figures of the same severity`]
      : []),
  ];
  const unchanged = `${digest.unchanged} open ${digest.unchanged === 1 ? 'alert' : 'alerts'} not repeated here`;
  return [
    ...(digest.unchanged === 0
      ? []
      : [
          {
            part: 'paragraph' as const,
            text: `${unchanged}${counts.length > 0 ? `; of them ${counts.join(', ')}` : ''}.`,
          },
        ]),
    { part: 'link', label: 'All alerts', url: digest.alertsUrl },
    ...CAUTIONS.map((text) => ({ part: 'quiet' as const, text })),
    { part: 'link', label: 'Stop this digest', url: digest.unsubscribeUrl },
  ];
}
