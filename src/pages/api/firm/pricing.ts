import { firmPricingChangeSchema } from '@/api-types/pricing';
import { changePricing, openPricing } from '@/server/catalogue/pricing-settings';
import { onlyMethods, reading, writing } from '@/server/endpoint';

export const GET = reading(({ db, actor }) => openPricing(db, actor));
export const PATCH = writing(firmPricingChangeSchema, ({ db, actor }, change) =>
  changePricing(db, actor, change),
);
export const ALL = onlyMethods('GET', 'PATCH');
