import type { APIRoute } from 'astro';
import { database } from '@/server/database';
import { jsonResponse, onlyMethods } from '@/server/endpoint';
import { planStatus } from '@/server/sheet-pack';

export const GET: APIRoute = async ({ params }) =>
  jsonResponse(await planStatus(await database(), params.id ?? ''));
export const ALL = onlyMethods('GET');
