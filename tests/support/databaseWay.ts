/** A way to the database that can be cut and joined again, for a process that is to lose it. */
import { once } from 'node:events';
import { connect, createServer, type AddressInfo, type Server, type Socket } from 'node:net';

export interface DatabaseWay {
  /** The database's address by this way. */
  readonly url: string;
  /** Ends every connection and takes no new one. */
  readonly cut: () => Promise<void>;
  readonly join: () => Promise<void>;
}

export async function openWay(databaseUrl: string): Promise<DatabaseWay> {
  const target = new URL(databaseUrl);
  const open = new Set<Socket>();
  let way: Server;
  let port = 0;
  const join = async () => {
    way = createServer((near) => {
      const far = connect(Number(target.port), target.hostname);
      for (const socket of [near, far]) open.add(socket.on('error', () => socket.destroy()));
      near.pipe(far).pipe(near);
    });
    way.listen(port, '127.0.0.1');
    await once(way, 'listening');
    port = (way.address() as AddressInfo).port;
  };
  await join();
  const url = new URL(databaseUrl);
  url.port = String(port);
  return {
    url: url.href,
    join,
    cut: async () => {
      for (const socket of open) socket.destroy();
      open.clear();
      if (!way.listening) return;
      way.close();
      await once(way, 'close');
    },
  };
}
