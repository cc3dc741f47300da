/** The web process: the built pages behind the product's own server. */
import { once } from 'node:events';
import { fileURLToPath } from 'node:url';
import { env } from '../src/server/config/env.ts';
import { log } from '../src/server/http/log.ts';
import { webServer, type Render } from '../src/server/http/webServer.ts';
import { runUntilTold } from './supervised.ts';

const dist = new URL('../dist/', import.meta.url);
const { HOST, PORT } = env();

const { handler } = (await import(new URL('server/entry.mjs', dist).href)) as { handler: Render };
const { server, drain } = webServer(handler, fileURLToPath(new URL('client', dist)));
runUntilTold('web', drain);
server.listen(PORT, HOST);
await once(server, 'listening');
log().info({ host: HOST, port: PORT }, 'web process listens');
