import type { APIRoute } from 'astro';
import { answer, onlyMethods } from '@/server/endpoint';
import { localLetter } from '@/server/mail/local-mail';

export const GET: APIRoute = async ({ clientAddress, params }) =>
  answer(await localLetter(clientAddress, params.id ?? ''));
export const ALL = onlyMethods('GET');
