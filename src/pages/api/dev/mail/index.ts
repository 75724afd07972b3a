import type { APIRoute } from 'astro';
import { answer, onlyMethods } from '@/server/endpoint';
import { localLetters } from '@/server/mail/local-mail';

export const GET: APIRoute = async ({ clientAddress }) => answer(await localLetters(clientAddress));
export const ALL = onlyMethods('GET');
