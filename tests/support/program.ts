/** A program of the product run as a process, with what it prints. */
import { spawn } from 'node:child_process';
import { once } from 'node:events';

export interface Program {
  readonly pid: number;
  /** Everything printed so far, both streams. */
  readonly output: () => string;
  /** Waits until the output fits; throws with the output where the program ends or the time passes first. */
  readonly until: (fits: RegExp, seconds?: number) => Promise<string>;
  readonly kill: (signal: NodeJS.Signals) => void;
  /** Exit code, or the signal that ended it. */
  readonly ended: Promise<number | NodeJS.Signals>;
}

/** `settings` are added to this process's environment; an empty text takes a variable out of it. */
export function startProgram(file: string, settings: Readonly<Record<string, string>>): Program {
  const all: NodeJS.ProcessEnv = { ...process.env, ...settings };
  const env = Object.fromEntries(Object.entries(all).filter(([, value]) => value !== ''));
  const node = file.endsWith('.ts') ? ['--import', 'tsx', file] : [file];
  const child = spawn(process.execPath, node, { env, stdio: ['ignore', 'pipe', 'pipe'] });
  let output = '';
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (piece: Buffer) => (output += piece.toString()));
  let end: number | NodeJS.Signals | null = null;
  const ended = once(child, 'close').then(([code, signal]: (number | NodeJS.Signals | null)[]) => {
    end = code ?? signal ?? 1;
    return end;
  });
  return {
    pid: child.pid ?? 0,
    output: () => output,
    until: async (fits, seconds = 60) => {
      for (let waited = 0; !fits.test(output); waited += 1) {
        if (end !== null || waited >= seconds * 20)
          throw new Error(`${file} (${end ?? 'running'}) never said ${String(fits)}:\n${output}`);
        await new Promise((resume) => setTimeout(resume, 50));
      }
      return output;
    },
    kill: (signal) => child.kill(signal),
    ended,
  };
}
