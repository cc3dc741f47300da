import { useRef, useState } from 'react';
import type { ProblemBody } from '../../contracts/problem.ts';
import { newIdempotencyKey, send, type Method, type Sending } from './api.ts';

interface Sent<T> {
  readonly busy: boolean;
  readonly problem: ProblemBody | null;
  /** Answers the value, or undefined where the server refused: then `problem` says why. */
  readonly submit: (
    method: Method,
    path: string,
    sending?: Omit<Sending, 'idempotencyKey'>,
  ) => Promise<T | undefined>;
  readonly clear: () => void;
}

/**
 * One change at a time. The key is made for the intention and kept while it is tried again after an outage, so
 * that nothing is done twice; an answer, whichever, ends it.
 */
export function useSending<T>(): Sent<T> {
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<ProblemBody | null>(null);
  const key = useRef<string | null>(null);
  return {
    busy,
    problem,
    clear: () => setProblem(null),
    submit: async (method, path, sending = {}) => {
      setBusy(true);
      key.current ??= newIdempotencyKey();
      const answer = await send<T>(method, path, { ...sending, idempotencyKey: key.current });
      setBusy(false);
      if (answer.ok || answer.problem.status < 500) key.current = null;
      setProblem(answer.ok ? null : answer.problem);
      return answer.ok ? answer.value : undefined;
    },
  };
}
