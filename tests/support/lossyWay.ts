/** A way to the database that can lose the answer to a COMMIT: the change is made, and who made it never learns. */
import { once } from 'node:events';
import { connect, createServer, type AddressInfo, type Socket } from 'node:net';

export interface LossyWay {
  /** The database through this way. */
  readonly url: string;
  /**
   * The next COMMIT of a change that is audited reaches the database; its answer is dropped with the connection, after
   * `then` was called.
   */
  readonly loseNextCommit: (then?: () => void) => void;
  /** Is there still an answer to lose? */
  readonly isArmed: () => boolean;
  readonly close: () => Promise<void>;
}

export async function openLossyWay(databaseUrl: string): Promise<LossyWay> {
  const { hostname, port } = new URL(databaseUrl);
  const open = new Set<Socket>();
  let armed: (() => void) | null = null;
  const server = createServer((near) => {
    const far = connect(Number(port), hostname);
    let lose: (() => void) | null = null;
    let isChange = false;
    near.on('data', (bytes) => {
      isChange ||= bytes.includes('insert into audit_entries');
      if (bytes.includes('COMMIT')) {
        if (armed && isChange) [lose, armed] = [armed, null];
        isChange = false;
      }
      far.write(bytes);
    });
    far.on('data', (bytes) => {
      if (!lose) return void near.write(bytes);
      lose();
      near.destroy();
    });
    for (const [one, another] of [
      [near, far],
      [far, near],
    ] as const) {
      open.add(one);
      one.on('error', () => another.destroy()).on('close', () => another.destroy());
    }
  }).listen(0, '127.0.0.1');
  await once(server, 'listening');
  const url = new URL(databaseUrl);
  url.port = String((server.address() as AddressInfo).port);
  return {
    url: url.href,
    loseNextCommit: (then = () => undefined) => {
      armed = then;
    },
    isArmed: () => armed !== null,
    close: async () => {
      for (const socket of open) socket.destroy();
      server.close();
      await once(server, 'close');
    },
  };
}
