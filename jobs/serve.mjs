/** Runs the product's processes together: one that fails is started again a few times, then all end. */
import { spawn } from 'node:child_process';
import { setTimeout as sleep } from 'node:timers/promises';
import {
  KillOnSignal,
  KillOthers,
  LogError,
  LogExit,
  LogOutput,
  Logger,
  RestartProcess,
  createConcurrently,
} from 'concurrently';

const READY_SECONDS = 60;

/** Without a shell between, and without the program `ps` that the usual way of ending process trees needs. */
const spawnNode = (command, options) => spawn(process.execPath, command.split(' '), options);

function endProcess(pid, signal = 'SIGTERM') {
  try {
    process.kill(pid, signal);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/**
 * A process told to end that answers with a code of its own (astro dev: 143) would count as failed and be started
 * again; `restarts` 0 keeps development from that.
 *
 * @param {{ name: string, command: string }[]} processes `command` is what node is given, separated by spaces
 * @param {NodeJS.ProcessEnv} env
 * @param {number} restarts how often one that failed is started again
 * @returns {{ ended: Promise<boolean>, stop: () => void }} `ended`: did all end without a fault?
 */
export function serve(processes, env, restarts) {
  const logger = new Logger({ prefixFormat: 'name' });
  const abortController = new AbortController();
  const { commands, result } = createConcurrently(
    processes.map(({ name, command }) => ({ name, command, env: { ...env, UNDERKEEL_SUPERVISED: '1' } })),
    {
      spawn: spawnNode,
      kill: endProcess,
      logger,
      outputStream: process.stdout,
      abortSignal: abortController.signal,
      successCondition: 'all',
      controllers: [
        new LogError({ logger }),
        new LogOutput({ logger }),
        new LogExit({ logger }),
        new KillOnSignal({ process, abortController }),
        new RestartProcess({ logger, delay: 1_000, tries: restarts }),
        new KillOthers({
          logger,
          abortController,
          conditions: ['failure', 'success'],
          killSignal: 'SIGTERM',
          timeoutMs: 15_000,
        }),
      ],
    },
  );
  return {
    ended: result.then(
      () => true,
      () => false,
    ),
    stop: () => commands.forEach((command) => command.kill('SIGTERM')),
  };
}

/** Waits until the address answers; false where it does not within a minute or `isOver` says to stop waiting. */
export async function untilAnswers(address, isOver) {
  for (let waited = 0; waited < READY_SECONDS * 5 && !isOver(); waited += 1) {
    const answer = await fetch(address, { signal: AbortSignal.timeout(5_000) }).catch(() => null);
    if (answer?.ok) return true;
    await sleep(200);
  }
  return false;
}
