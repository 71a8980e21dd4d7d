import { json, type Handle, type RequestEvent } from '@sveltejs/kit';
import { isRefusal } from '../base/index.ts';
import {
  openService,
  PORT_VARIABLE,
  refusalOfRequest,
  refusalReply,
  SECURITY_HEADERS,
} from '../server/index.ts';

let opened: ReturnType<typeof openService> | null = null;

/** Refuses what does not come from the page itself, and hands the file service to the routes. */
export const handle: Handle = async ({ event, resolve }) => {
  const answer = refused(event) ?? (await withService(event, resolve));
  for (const [name, value] of Object.entries(SECURITY_HEADERS)) answer.headers.set(name, value);
  if (event.url.pathname.startsWith('/api/')) answer.headers.set('cache-control', 'no-store');
  return answer;
};

function refused({ request, url }: RequestEvent): Response | null {
  // The development server is told no port; there the address it was asked under has to do.
  const port = Number(process.env[PORT_VARIABLE] ?? url.port);
  const message = refusalOfRequest(
    {
      method: request.method,
      path: url.pathname,
      host: request.headers.get('host'),
      origin: request.headers.get('origin'),
      site: request.headers.get('sec-fetch-site'),
      mode: request.headers.get('sec-fetch-mode'),
    },
    port,
  );
  return message === null ? null : json({ message, code: 'foreign' }, { status: 403 });
}

async function withService(
  event: RequestEvent,
  resolve: Parameters<Handle>[0]['resolve'],
): Promise<Response> {
  opened ??= openService(process.env);
  const service = await opened;
  if (isRefusal(service)) {
    opened = null;
    const { status, body } = refusalReply(service);
    return json(body, { status });
  }
  event.locals.service = service;
  return resolve(event);
}
