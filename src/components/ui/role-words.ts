import type { Role } from '@/api-types/people';

export const ROLE_WORDS: Record<Role, string> = {
  owner: 'Owner',
  designer: 'Designer',
  installer: 'Installer',
  client: 'Client',
};
