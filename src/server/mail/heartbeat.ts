/** What every administrator gets after every run, so that silence is never taken for health. */
import { renderMail, type MailPart, type RenderedMail } from './mailDocument.ts';

export interface Heartbeat {
  readonly lenderName: string;
  /** '1 Dec 2026' */
  readonly day: string;
  readonly attempt: number;
  readonly isLookBack: boolean;
  readonly knownAt: string;
  readonly runAt: string;
  readonly tested: number;
  readonly total: number;
  readonly alerts: { readonly raised: number; readonly worsened: number; readonly closed: number };
  readonly digests: number;
  /** Mails of earlier runs and others that still wait to be sent. */
  readonly mailsWaiting: number;
  /** By number and desk: an administrator does not read borrowers. */
  readonly failures: readonly string[];
  /** Told outside the database: whoever cuts the end off the log there cannot cut it off this mail. */
  readonly auditHead: { readonly seq: number; readonly hash: string };
  readonly runsUrl: string;
}

export function heartbeatMail(heartbeat: Heartbeat): RenderedMail & { readonly subject: string } {
  const { tested, total, failures, alerts } = heartbeat;
  const state =
    failures.length === 0
      ? `tested ${tested} of ${total}`
      : `tested ${tested} of ${total}, ${failures.length} failed`;
  const subject = `[${heartbeat.lenderName}] Nightly run: ${state} - ${heartbeat.day}`;
  const parts: MailPart[] = [
    { part: 'title', text: subject },
    {
      part: 'quiet',
      text: `Business date ${heartbeat.day}, attempt ${heartbeat.attempt}. Figures known at ${heartbeat.knownAt}. Run at ${heartbeat.runAt}.`,
    },
    { part: 'paragraph', text: `Tested ${tested} of ${total} borrowers.` },
    {
      part: 'paragraph',
      text: `Alerts: ${alerts.raised} raised, ${alerts.worsened} worsened, ${alerts.closed} closed by themselves.`,
    },
    {
      part: 'paragraph',
      text: heartbeat.isLookBack
        ? 'A later business date was computed before: these results are kept beside it, raise no alert and go into no digest.'
        : `Mails queued: ${heartbeat.digests} ${heartbeat.digests === 1 ? 'digest' : 'digests'}. ${heartbeat.mailsWaiting} other mails wait to be sent.`,
    },
    { part: 'heading', text: 'What failed to run' },
    ...(failures.length === 0
      ? [{ part: 'paragraph' as const, text: 'Nothing.' }]
      : failures.map((text) => ({ part: 'paragraph' as const, text }))),
    {
      part: 'paragraph',
      text: `Audit log at its end: entry ${heartbeat.auditHead.seq}, hash ${heartbeat.auditHead.hash}. Keep this mail: an audit log whose entry of that number has another hash, or is gone, was changed.`,
    },
    { part: 'link', label: 'Open the runs', url: heartbeat.runsUrl },
  ];
  return { subject, ...renderMail(subject, parts) };
}
