import type { RequestHandler } from '@sveltejs/kit';
import { eventStream } from '../../../server/index.ts';

export const GET: RequestHandler = ({ locals }) =>
  new Response(eventStream(locals.service.watch), {
    headers: { 'content-type': 'text/event-stream', 'cache-control': 'no-store' },
  });
