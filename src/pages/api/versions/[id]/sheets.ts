import { onlyMethods, reading } from '@/server/endpoint';
import { openSheetPack } from '@/server/sheet-pack';

export const GET = reading(({ db, actor, id }) => openSheetPack(db, actor, id));
export const ALL = onlyMethods('GET');
