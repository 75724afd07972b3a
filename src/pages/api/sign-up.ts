import { signUpSchema } from '@/api-types/people';
import { onlyMethods } from '@/server/endpoint';
import { signUp } from '@/server/people';
import { entering } from '@/server/entering';

export const POST = entering(signUpSchema, signUp, 201);
export const ALL = onlyMethods('POST');
