/**
 * One command at a time per data folder. The place is a socket that the kernel frees with the process that holds
 * it, so that nothing stale is ever left behind, and whoever comes second learns who is there.
 */
import { createHash } from 'node:crypto';
import { mkdirSync, realpathSync, rmSync } from 'node:fs';
import { connect, createServer } from 'node:net';
import { join } from 'node:path';

function addressOf(dataFolder) {
  const hash = createHash('sha256').update(realpathSync(dataFolder)).digest('hex').slice(0, 16);
  return process.platform === 'linux' ? `\0underkeel-${hash}` : join(dataFolder, 'place.sock');
}

/** Who holds the place: null where nobody answers. */
const askHolder = (address) =>
  new Promise((done) => {
    let text = '';
    connect(address)
      .on('data', (piece) => (text += piece))
      .on('error', () => done(null))
      .on('close', () => done(text ? JSON.parse(text) : null));
  });

const listen = (server, address) =>
  new Promise((done, failed) => {
    server.once('error', failed).listen(address, () => done(undefined));
  });

/**
 * @param {string} dataFolder
 * @param {{ command: string, address?: string }} holder what the next one is told
 * @returns {Promise<{ isFree: true, leave: () => void } | { isFree: false, holder: { command: string, address?: string } }>}
 */
export async function takePlace(dataFolder, holder) {
  mkdirSync(dataFolder, { recursive: true, mode: 0o711 });
  const address = addressOf(dataFolder);
  for (let attempt = 1; ; attempt += 1) {
    const server = createServer((socket) => socket.on('error', () => {}).end(JSON.stringify(holder)));
    try {
      await listen(server, address);
      server.unref();
      return { isFree: true, leave: () => server.close() };
    } catch (error) {
      if (error.code !== 'EADDRINUSE') throw error;
      const there = await askHolder(address);
      if (there) return { isFree: false, holder: there };
      if (attempt === 20) throw error;
      if (!address.startsWith('\0')) rmSync(address, { force: true });
    }
  }
}
