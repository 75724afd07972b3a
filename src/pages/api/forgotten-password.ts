import { forgottenPasswordSchema } from '@/api-types/account';
import { onlyMethods } from '@/server/endpoint';
import { visiting } from '@/server/entering';
import { forgottenPassword } from '@/server/new-passwords';

export const POST = visiting(forgottenPasswordSchema, forgottenPassword);
export const ALL = onlyMethods('POST');
