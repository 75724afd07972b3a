import { signInSchema } from '@/api-types/people';
import { onlyMethods } from '@/server/endpoint';
import { entering } from '@/server/entering';
import { signIn } from '@/server/people';

export const POST = entering(signInSchema, signIn);
export const ALL = onlyMethods('POST');
