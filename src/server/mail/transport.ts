/** One message to one address over SMTP, and what became of it. */
import { createHash } from 'node:crypto';
import { createTransport } from 'nodemailer';
import { env, type Env } from '../config/env.ts';
import { isSingleAddress, oneLine } from './address.ts';

const TIMEOUT_MS = 10_000;

export interface OutgoingMessage {
  /** Unique and stable: the Message-ID is made from it, so that a message sent twice can be told. */
  readonly messageKey: string;
  readonly toName: string;
  readonly toAddress: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly headers: Readonly<Record<string, string>>;
}

export type SendOutcome =
  | { readonly kind: 'sent' }
  /** The server said no for now, or only to this message's try; `isServerGone`: no server was reached at all. */
  | { readonly kind: 'later'; readonly reason: string; readonly isServerGone: boolean }
  | { readonly kind: 'refused'; readonly reason: string };

export interface MailTransport {
  readonly send: (message: OutgoingMessage) => Promise<SendOutcome>;
}

/** The lender's SMTP server, or the local sink where none is configured. */
export function mailTransport(
  settings: Pick<Env, 'SMTP_URL' | 'MAIL_SINK_PORT' | 'MAIL_FROM'> = env(),
): MailTransport {
  const { SMTP_URL, MAIL_SINK_PORT, MAIL_FROM } = settings;
  const smtp = new URL(SMTP_URL ?? `smtp://127.0.0.1:${MAIL_SINK_PORT}`);
  const isSecure = smtp.protocol === 'smtps:';
  const transport = createTransport({
    host: smtp.hostname,
    port: Number(smtp.port || (isSecure ? 465 : 587)),
    secure: isSecure,
    ignoreTLS: SMTP_URL === undefined,
    // Links to set a password travel in mail: off this machine only encrypted, or not at all.
    requireTLS: SMTP_URL !== undefined && !/^(localhost|127(\.\d+){3}|\[::1\])$/.test(smtp.hostname),
    ...(smtp.username && {
      auth: { user: decodeURIComponent(smtp.username), pass: decodeURIComponent(smtp.password) },
    }),
    connectionTimeout: TIMEOUT_MS,
    greetingTimeout: TIMEOUT_MS,
    socketTimeout: TIMEOUT_MS,
    disableFileAccess: true,
    disableUrlAccess: true,
  });

  return {
    send: async (message) => {
      if (!isSingleAddress(message.toAddress))
        return { kind: 'refused', reason: 'the address is not one plain mail address' };
      try {
        await transport.sendMail({
          from: { name: 'Underkeel', address: MAIL_FROM },
          to: { name: oneLine(message.toName), address: message.toAddress },
          envelope: { from: MAIL_FROM, to: [message.toAddress] },
          messageId: messageId(message.messageKey, MAIL_FROM),
          subject: oneLine(message.subject),
          text: message.text,
          html: message.html,
          headers: { 'Auto-Submitted': 'auto-generated', ...message.headers },
        });
        return { kind: 'sent' };
      } catch (error) {
        return outcomeOf(error);
      }
    },
  };
}

function messageId(messageKey: string, from: string): string {
  const unique = createHash('sha256').update(messageKey).digest('hex').slice(0, 40);
  return `<${unique}@${from.slice(from.lastIndexOf('@') + 1)}>`;
}

/** RFC 5321 4.2.1: 5yz is a permanent no, 4yz one for now. Anything that is no answer of the server is tried again. */
function outcomeOf(error: unknown): SendOutcome {
  if (!(error instanceof Error)) throw error;
  const code = 'responseCode' in error && typeof error.responseCode === 'number' ? error.responseCode : null;
  const reason = oneLine(error.message).slice(0, 900);
  // The product's own sign-in to the server, or its encryption: mend the setting, and the mail goes out.
  const isSetting = 'code' in error && (error.code === 'EAUTH' || error.code === 'ETLS');
  if (code !== null && code >= 500 && !isSetting) return { kind: 'refused', reason };
  return { kind: 'later', reason, isServerGone: code === null || isSetting };
}
