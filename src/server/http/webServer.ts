/**
 * The web process around the built pages: limits on what a client may send and how slowly, files from the disk,
 * and an end that lets requests finish.
 */
import { randomUUID } from 'node:crypto';
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import { setTimeout as sleep } from 'node:timers/promises';
import { env } from '../config/env.ts';
import { bodyBytesMost, counted, declaresTooMuch, isUpload } from './bodyLimit.ts';
import { rewriteForwarded } from './forwarded.ts';
import { setMissingHeaders } from './headers.ts';
import { log } from './log.ts';
import { problemBody, type PlainProblem } from './problem.ts';
import { serveStatic } from './staticFiles.ts';

const HEADERS_TIMEOUT_MS = 15_000;
const REQUEST_TIMEOUT_MS = 60_000;
const CHECKING_INTERVAL_MS = 5_000;
const CONNECTIONS_MOST = 1_000;
const IN_FLIGHT_MOST = 200;
/** A file is held in memory while it is read, and only two are read at once. */
const UPLOADS_MOST = 16;
const DRAIN_MS_MOST = 10_000;
/** How long a client that was refused may go on sending before its connection is cut. */
const LINGER_MS = 2_000;

/** The adapter's handler. `locals` reach the middleware: they are the only place a client cannot write to. */
export type Render = (
  request: IncomingMessage,
  response: ServerResponse,
  next: undefined,
  locals: { address: string },
) => Promise<void>;

export interface WebServer {
  readonly server: Server;
  /** Refuses what is new, lets requests in flight finish for ten seconds at most, then closes. */
  readonly drain: () => Promise<void>;
}

export function webServer(render: Render, clientFolder: string): WebServer {
  let isDraining = false;
  let inFlight = 0;
  let uploads = 0;

  const handle = (request: IncomingMessage, response: ServerResponse): void => {
    const isBusy =
      (inFlight >= IN_FLIGHT_MOST && request.url !== '/livez') ||
      (isUpload(request) && uploads >= UPLOADS_MOST);
    const refusal = refuseAtOnce(request, isDraining, isBusy);
    if (refusal) {
      refuse(request, response, refusal);
      return;
    }
    const more = isUpload(request) ? 1 : 0;
    inFlight += 1;
    uploads += more;
    response.once('close', () => {
      inFlight -= 1;
      uploads -= more;
    });
    limitBody(request, response);
    setStrictHeaders(response);
    const { BEHIND_PROXY, APP_URL } = env();
    rewriteForwarded(request.headers, { behindProxy: BEHIND_PROXY, appUrl: APP_URL });
    const address = request.socket.remoteAddress ?? 'unknown';
    serveStatic(clientFolder, request, response, () => {
      render(request, response, undefined, { address }).catch((error: unknown) => {
        log().error({ err: error }, 'the pages failed to answer');
        response.destroy();
      });
    });
  };

  const server = createServer(
    {
      headersTimeout: HEADERS_TIMEOUT_MS,
      requestTimeout: REQUEST_TIMEOUT_MS,
      connectionsCheckingInterval: CHECKING_INTERVAL_MS,
    },
    handle,
  );
  server.maxConnections = CONNECTIONS_MOST;

  const drain = async (): Promise<void> => {
    isDraining = true;
    for (let waited = 0; inFlight > 0 && waited < DRAIN_MS_MOST; waited += 50) await sleep(50);
    const closed = new Promise((done) => server.close(done));
    server.closeAllConnections();
    await closed;
  };
  return { server, drain };
}

/** What is refused before anything of it is read. */
function refuseAtOnce(request: IncomingMessage, isDraining: boolean, isBusy: boolean): PlainProblem | null {
  const { method, url = '' } = request;
  if (method === 'TRACE' || method === 'CONNECT')
    return {
      status: 405,
      title: 'Method not known here',
      detail: `This product does not take ${method}.`,
    };
  if (!url.startsWith('/') || !canDecode(url))
    return { status: 400, title: 'Address not understood', detail: 'The address cannot be read.' };
  if (isDraining && url !== '/livez')
    return {
      status: 503,
      title: 'Shutting down',
      detail: 'The product is shutting down. Nothing was changed. Try again in a few seconds.',
      retryAfterSeconds: 5,
    };
  if (isBusy)
    return {
      status: 503,
      title: 'Too busy',
      detail: 'Too many requests are being answered. Nothing was changed. Try again in a few seconds.',
      retryAfterSeconds: 2,
    };
  return declaresTooMuch(request, bodyBytesMost(request)) ? tooLarge(request) : null;
}

function canDecode(url: string): boolean {
  try {
    decodeURI(url);
    return true;
  } catch (error) {
    if (error instanceof URIError) return false;
    throw error;
  }
}

const tooLarge = (request: IncomingMessage): PlainProblem => ({
  status: 413,
  title: 'Too large',
  detail: `What was sent is larger than ${Math.floor(bodyBytesMost(request) / 1024 / 1024)} MB. Nothing was changed. Send less at once.`,
});

/** What answers before the middleware runs (a redirect of the framework's own) has these; a page brings its own. */
function setStrictHeaders(response: ServerResponse): void {
  const headers = new Headers();
  setMissingHeaders(headers, false);
  response.setHeaders(headers);
}

/** The adapter reads `body` instead of the request where it is there. */
function limitBody(request: IncomingMessage, response: ServerResponse): void {
  const refuseSize = (): void => {
    refuse(request, response, tooLarge(request));
    // The page that was reading the body answers too, later; its answer has nowhere to go.
    Object.assign(response, { writeHead: () => response, write: () => true, end: () => response });
  };
  const pieces = request.iterator({ destroyOnReturn: false });
  Object.assign(request, { body: counted(pieces, bodyBytesMost(request), refuseSize) });
}

function refuse(request: IncomingMessage, response: ServerResponse, problem: PlainProblem): void {
  if (response.headersSent) {
    response.destroy();
    return;
  }
  const requestId = randomUUID();
  const headers = new Headers({
    'content-type': 'application/problem+json; charset=utf-8',
    'x-request-id': requestId,
    connection: 'close',
  });
  if (problem.status === 405) headers.set('allow', 'GET, HEAD, POST, PUT, PATCH, DELETE, OPTIONS');
  if (problem.retryAfterSeconds !== undefined) headers.set('retry-after', String(problem.retryAfterSeconds));
  setMissingHeaders(headers, false);
  const body = JSON.stringify(problemBody(requestId, problem));
  headers.set('content-length', String(Buffer.byteLength(body)));
  response.writeHead(problem.status, Object.fromEntries(headers));
  // Ended only once the client has stopped sending: a connection closed under it would take the answer with it.
  response.write(body);
  const end = response.end.bind(response);
  request.once('end', () => end()).resume();
  const { socket } = request;
  setTimeout(() => socket.destroy(), LINGER_MS).unref();
}
