/**
 * node --import tsx tests/bench/signIn.ts ADDRESS EMAIL EMAIL EMAIL: measures a running product whose limits of tries are fresh.
 *
 * 1. Does the time of a refused sign-in tell a known address from an unknown one? Two-sided Mann-Whitney test on 100
 *    of each, in turn, from addresses that differ (the product must be told BEHIND_PROXY=1).
 * 2. Does the process stay alive to others while 500 sign in at once?
 */
import { request } from 'node:http';
import { setTimeout as sleep } from 'node:timers/promises';

const EACH = 100;
/** Below the limit of tries for one account, after which another answer comes sooner. */
const TRIES_PER_ACCOUNT = 40;
const AT_ONCE = 500;

const [address = '', ...emails] = process.argv.slice(2);
if (!address || emails.length * TRIES_PER_ACCOUNT < EACH)
  throw new Error('usage: signIn.ts ADDRESS EMAIL EMAIL EMAIL');
const { hostname, port } = new URL(address);

interface Answer {
  readonly status: number;
  readonly ms: number;
}

function send(method: string, path: string, from: string, json: unknown = null): Promise<Answer> {
  const began = performance.now();
  return new Promise((done, failed) => {
    const headers = { origin: address, 'content-type': 'application/json', 'x-forwarded-for': from };
    const sending = request({ hostname, port, method, path, agent: false, headers }, (answer) => {
      answer
        .resume()
        .once('end', () => done({ status: answer.statusCode ?? 0, ms: performance.now() - began }));
    });
    sending.once('error', failed).end(json === null ? '' : JSON.stringify(json));
  });
}

/** Every try from an address of its own, so that no limit answers instead of the password. */
const signIn = (name: string, n: number): Promise<Answer> =>
  send('POST', '/api/v1/session', `2001:db8:0:${n.toString(16)}::1`, {
    email: name,
    password: 'not the password',
  });

const median = (values: readonly number[]): number =>
  [...values].sort((a, b) => a - b)[values.length >> 1] ?? 0;

/** Two-sided p by the normal approximation, without ties: two times of this clock are never equal. */
function mannWhitney(a: readonly number[], b: readonly number[]): number {
  const u = a.reduce((sum, one) => sum + b.filter((other) => other < one).length, 0);
  const mean = (a.length * b.length) / 2;
  const deviation = Math.sqrt((a.length * b.length * (a.length + b.length + 1)) / 12);
  const z = Math.abs(u - mean) / deviation;
  // Abramowitz and Stegun 26.2.17, error below 7.5e-8.
  const t = 1 / (1 + 0.2316419 * z);
  const tail =
    t * (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))));
  return 2 * (Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)) * tail;
}

async function timing(): Promise<void> {
  const known: number[] = [];
  const unknown: number[] = [];
  const statuses = new Set<number>();
  for (let n = 0; n < EACH; n += 1) {
    const order = n % 2 === 0 ? ['known', 'unknown'] : ['unknown', 'known'];
    for (const which of order) {
      const name = which === 'known' ? (emails[n % emails.length] ?? '') : `nobody.${n}@lender.example`;
      const { status, ms } = await signIn(name, 2 * n + (which === 'known' ? 0 : 1));
      statuses.add(status);
      (which === 'known' ? known : unknown).push(ms);
    }
  }
  console.log(
    `known ${median(known).toFixed(2)} ms, unknown ${median(unknown).toFixed(2)} ms (medians of ${EACH}), p ${mannWhitney(known, unknown).toFixed(3)}, statuses ${[...statuses].join(' ')}`,
  );
}

async function flood(): Promise<void> {
  const all = Promise.all(
    Array.from({ length: AT_ONCE }, (_, n) => signIn(`nobody.${n}@lender.example`, 10_000 + n)),
  );
  const probes: Answer[] = [];
  let isOver = false;
  void all.finally(() => (isOver = true));
  while (!isOver) {
    probes.push(await send('GET', '/livez', '2001:db8::ffff'));
    await sleep(50);
  }
  const counts: Record<number, number> = {};
  for (const { status } of await all) counts[status] = (counts[status] ?? 0) + 1;
  const times = probes.map(({ ms }) => ms).sort((a, b) => a - b);
  const at = (share: number) => (times[Math.floor(times.length * share)] ?? 0).toFixed(0);
  const wrong = probes.filter(({ status }) => status !== 200).length;
  console.log(
    `${AT_ONCE} at once: ${JSON.stringify(counts)}; /livez p50 ${at(0.5)} ms, p95 ${at(0.95)} ms, ${wrong} of ${probes.length} not 200`,
  );
}

await timing();
await flood();
