import { json, type RequestHandler } from '@sveltejs/kit';
import { openReply, saveReply } from '../../../../server/index.ts';

export const GET: RequestHandler = async ({ locals, params }) => {
  const { status, body } = await openReply(locals.service, params.name ?? '');
  return json(body, { status });
};

export const PUT: RequestHandler = async ({ locals, params, request }) => {
  const { status, body } = await saveReply(locals.service, params.name ?? '', request);
  return json(body, { status });
};
