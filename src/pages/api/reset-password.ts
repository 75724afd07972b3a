import { resetPasswordSchema } from '@/api-types/account';
import { onlyMethods } from '@/server/endpoint';
import { entering } from '@/server/entering';
import { resetPassword } from '@/server/new-passwords';

export const POST = entering(resetPasswordSchema, resetPassword);
export const ALL = onlyMethods('POST');
