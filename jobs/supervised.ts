/** How a process of the product ends: when it is told to, when its supervisor is gone, or on an error nobody caught. */
import { log } from '../src/server/http/log.ts';

/** Calls `end` once and exits: 0 where told to end, 1 after an uncaught error. */
export function runUntilTold(name: string, end: () => Promise<void>): void {
  let isEnding = false;
  const finish = (why: string, exitCode: number): void => {
    if (isEnding) return;
    isEnding = true;
    log().info({ process: name, why }, 'ending');
    end().then(
      () => process.exit(exitCode),
      (error: unknown) => {
        log().fatal({ err: error, process: name }, 'could not end cleanly');
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', () => finish('SIGTERM', 0));
  process.on('SIGINT', () => finish('SIGINT', 0));
  // Under npm start the standard input ends with the supervisor, however that one dies.
  if (process.env['UNDERKEEL_SUPERVISED'] === '1')
    process.stdin.on('end', () => finish('supervisor gone', 0)).resume();
  for (const event of ['uncaughtException', 'unhandledRejection'] as const)
    process.on(event, (error: unknown) => {
      log().fatal({ err: error, process: name }, event);
      finish(event, 1);
    });
}
