/** The log: one JSON object a line, so that no value can begin a line of its own. Secrets are never passed in. */
import { pino, type Logger } from 'pino';
import { env } from '../config/env.ts';

let logger: Logger | null = null;

export function log(): Logger {
  logger ??= pino({ level: env().LOG_LEVEL, base: null, serializers: { err: loggedError } });
  return logger;
}

/** A database error carries the statement and its values: what is kept is what happened and where. */
function loggedError(error: unknown): Record<string, unknown> {
  if (!(error instanceof Error)) return { message: typeof error === 'string' ? error : typeof error };
  const parent: unknown = 'parent' in error ? error.parent : null;
  const part = (name: string): unknown =>
    typeof parent === 'object' && parent !== null && name in parent
      ? (parent as Record<string, unknown>)[name]
      : undefined;
  const frames = (error.stack ?? '').split('\n').filter((line) => line.trimStart().startsWith('at '));
  return {
    name: error.name,
    ...(parent === null ? { message: error.message } : { errno: part('errno'), code: part('code') }),
    frames: frames.slice(0, 12).map((line) => line.trim()),
  };
}
