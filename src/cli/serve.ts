import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import {
  FOLDER_VARIABLE,
  openFolder,
  PORT_VARIABLE,
  refusalOfRequest,
  SECURITY_HEADERS,
} from '../server/index.ts';

const ADDRESS = '127.0.0.1';
const DEFAULT_PORT = 4600;
const PORTS_TRIED = 50;
/** A worksheet of the largest size, with every character escaped once in JSON. */
const BODY_LIMIT = '12M';

/** The page's server as adapter-node builds it. */
type PageHandler = (request: IncomingMessage, response: ServerResponse) => void;

/** A running page. */
export interface ServedPage {
  /** Where it is, `http://127.0.0.1:4600/`. */
  readonly address: string;
  /** The folder that is served, links resolved. */
  readonly folder: string;
  /** Ends all connections and frees the port. */
  close(): Promise<void>;
}

/**
 * Serves the page on the loopback interface of this machine, and on no other.
 *
 * @param folder the worksheet folder
 * @param port the port to take, 0 for any; null takes 4600 or the next one that is free
 * @param loadPage loads the built page's server, once the environment says what to serve
 * @returns the running page, or why it cannot run (`port-taken`, or what is wrong with the folder)
 */
export async function serve(
  folder: string,
  port: number | null,
  loadPage: () => Promise<PageHandler>,
): Promise<ServedPage | Refusal> {
  const opened = await openFolder(folder);
  if (isRefusal(opened)) return opened;
  let page: Promise<PageHandler> | null = null;
  const server = createServer((request, response) => {
    if (answersForeign(request, response, portOf(server))) return;
    void page?.then((handle) => handle(request, response));
  });
  const taken = await listen(server, port);
  if (taken !== null) return taken;
  setEnvironment(opened.path, portOf(server));
  page = loadPage();
  await page;
  return {
    address: `http://${ADDRESS}:${portOf(server)}/`,
    folder: opened.path,
    close: () => close(server),
  };
}

/** The page's server reads its settings from the environment when it is loaded. */
function setEnvironment(folder: string, port: number) {
  process.env[FOLDER_VARIABLE] = folder;
  process.env[PORT_VARIABLE] = String(port);
  process.env.ORIGIN = `http://${ADDRESS}:${port}`;
  process.env.BODY_SIZE_LIMIT = BODY_LIMIT;
}

/** Answers a request that does not come from the page itself; the built page's files are guarded here too. */
function answersForeign(request: IncomingMessage, response: ServerResponse, port: number): boolean {
  for (const [name, value] of Object.entries(SECURITY_HEADERS)) response.setHeader(name, value);
  const message = refusalOfRequest(
    {
      method: request.method ?? 'GET',
      path: request.url ?? '/',
      host: header(request, 'host'),
      origin: header(request, 'origin'),
      site: header(request, 'sec-fetch-site'),
      mode: header(request, 'sec-fetch-mode'),
    },
    port,
  );
  if (message === null) return false;
  response.writeHead(403, { 'content-type': 'application/json' });
  response.end(JSON.stringify({ message, code: 'foreign' }));
  return true;
}

function header(request: IncomingMessage, name: string): string | null {
  const value = request.headers[name];
  return typeof value === 'string' ? value : null;
}

function portOf(server: Server): number {
  return (server.address() as AddressInfo).port;
}

/** Takes the port, or the first free one from the default on; returns a refusal if there is none. */
async function listen(server: Server, port: number | null): Promise<Refusal | null> {
  const first = port ?? DEFAULT_PORT;
  const last = port ?? DEFAULT_PORT + PORTS_TRIED - 1;
  for (let candidate = first; candidate <= last; candidate++) {
    if (await takesPort(server, candidate)) return null;
  }
  const ports = first === last ? `Port ${first} is` : `Ports ${first} to ${last} are`;
  return refuse('port-taken', `${ports} taken or not allowed; choose another with --port.`);
}

function takesPort(server: Server, port: number): Promise<boolean> {
  return new Promise((settle, fail) => {
    const onError = (error: NodeJS.ErrnoException) => {
      server.off('listening', onListening);
      if (error.code === 'EADDRINUSE' || error.code === 'EACCES') settle(false);
      else fail(error);
    };
    const onListening = () => {
      server.off('error', onError);
      settle(true);
    };
    server.once('error', onError);
    server.once('listening', onListening);
    server.listen(port, ADDRESS);
  });
}

function close(server: Server): Promise<void> {
  return new Promise((settle) => {
    server.close(() => settle());
    server.closeAllConnections();
  });
}
