/** process.env, read once: every variable with its unit and default, every fault at once. */
import { resolve } from 'node:path';
import { z } from 'zod';

const flag = z.enum(['0', '1']).transform((text) => text === '1');

const schema = z.object({
  /** The application's database user. */
  DATABASE_URL: z.url({ protocol: /^(mariadb|mysql)$/ }),
  /** The user that owns the schema, for migrations; the same as DATABASE_URL where there is only one. */
  DATABASE_OWNER_URL: z.url({ protocol: /^(mariadb|mysql)$/ }).optional(),
  /** The address that people type; links in mail are built from it. */
  APP_URL: z.url({ protocol: /^https?$/ }).default('http://127.0.0.1:4321'),
  HOST: z.string().default('127.0.0.1'),
  PORT: z.coerce.number().int().min(0).max(65_535).default(4321),
  /** Folder for stored files, the local database and secrets. */
  DATA_DIR: z
    .string()
    .default('.data')
    .transform((path) => resolve(path)),
  /** SMTP server of the lender; without it mail goes to the local sink on MAIL_SINK_PORT. */
  SMTP_URL: z.url({ protocol: /^smtps?$/ }).optional(),
  MAIL_SINK_PORT: z.coerce.number().int().min(1).max(65_535).default(4325),
  MAIL_FROM: z.email().default('underkeel@lender.example'),
  /** Secret that keys the audit chain, 32 bytes or more; npm start makes one in DATA_DIR where none is given. */
  AUDIT_KEY: z.string().min(32),
  SESSION_IDLE_MINUTES: z.coerce.number().int().min(1).default(30),
  SESSION_LIFETIME_HOURS: z.coerce.number().int().min(1).default(12),
  /** 1: the named proxy in front appends the client's address to X-Forwarded-For. */
  BEHIND_PROXY: flag.default(false),
  /** 0: the worker starts no nightly run by itself; runs are started by hand or by another worker. */
  NIGHT_SCHEDULE: flag.default(true),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
});

export type Env = z.infer<typeof schema>;

/** The names, in the order of .env.example. */
export const SETTING_NAMES = Object.keys(schema.shape);

let read: Env | null = null;

/** Throws with every fault named, so that a start-up fails once and not variable by variable. */
export function env(): Env {
  if (read) return read;
  const parsed = schema.safeParse(process.env);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`settings cannot be used:\n${faults.join('\n')}\nSee .env.example.`);
  }
  read = Object.freeze(parsed.data);
  return read;
}
