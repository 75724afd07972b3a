import type { APIRoute } from 'astro';
import { jsonResponse, onlyMethods } from '@/server/endpoint';
import { health } from '@/server/health';

export const GET: APIRoute = async () => jsonResponse(await health());
export const ALL = onlyMethods('GET');
