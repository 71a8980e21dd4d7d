import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import { carriesToken } from './access.ts';
import type { FileService } from './service.ts';

/** The header in which a write carries the service's token. */
export const TOKEN_HEADER = 'x-loopwright-token';

/** What a route answers: a status and a body for JSON. */
export interface Reply {
  readonly status: number;
  readonly body: unknown;
}

const STATUS_OF: Readonly<Record<string, number>> = {
  'bad-name': 400,
  'bad-request': 400,
  outside: 403,
  'no-token': 403,
  'read-only': 403,
  missing: 404,
  'no-folder': 404,
  'too-large': 413,
  'not-utf8': 422,
  'not-text': 422,
  'not-a-file': 422,
};

/** Answers a refusal with its status, reason and code. */
export function refusalReply({ code, reason }: Refusal): Reply {
  return { status: STATUS_OF[code] ?? 500, body: { message: reason, code } };
}

/** GET /api/worksheets: {worksheets: [{name, modified, hash}], folder}. */
export async function listReply({ folder }: FileService): Promise<Reply> {
  const worksheets = await folder.list();
  if (isRefusal(worksheets)) return refusalReply(worksheets);
  return { status: 200, body: { worksheets, folder: folder.path } };
}

/** GET /api/worksheets/NAME: {name, text, hash, readOnly}. */
export async function openReply({ folder }: FileService, name: string): Promise<Reply> {
  const opened = await folder.open(name);
  return isRefusal(opened) ? refusalReply(opened) : { status: 200, body: opened };
}

/**
 * PUT /api/worksheets/NAME with {text, baseHash}: 200 {hash}, or 409 {text, hash} with what is on disk where that is
 * not the version that the edit began from.
 */
export async function saveReply(
  { folder, token }: FileService,
  name: string,
  request: Request,
): Promise<Reply> {
  if (!carriesToken(request.headers.get(TOKEN_HEADER), token)) {
    return refusalReply(refuse('no-token', 'The page is out of date: reload it, then save again.'));
  }
  const order = await saveOrder(request);
  if (isRefusal(order)) return refusalReply(order);
  const saved = await folder.save(name, order.text, order.baseHash);
  if (isRefusal(saved)) return refusalReply(saved);
  const { kind, ...body } = saved;
  return { status: kind === 'saved' ? 200 : 409, body };
}

interface SaveOrder {
  readonly text: string;
  readonly baseHash: string | null;
}

async function saveOrder(request: Request): Promise<SaveOrder | Refusal> {
  const sent: unknown = await request.json().catch(() => null);
  if (isSaveOrder(sent)) return sent;
  return refuse('bad-request', 'A save is JSON: {"text": string, "baseHash": string or null}.');
}

function isSaveOrder(sent: unknown): sent is SaveOrder {
  if (typeof sent !== 'object' || sent === null) return false;
  const { text, baseHash } = sent as Partial<Record<keyof SaveOrder, unknown>>;
  return typeof text === 'string' && (baseHash === null || typeof baseHash === 'string');
}
