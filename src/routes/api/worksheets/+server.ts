import { json, type RequestHandler } from '@sveltejs/kit';
import { listReply } from '../../../server/index.ts';

export const GET: RequestHandler = async ({ locals }) => {
  const { status, body } = await listReply(locals.service);
  return json(body, { status });
};
