import { openPhoneStore } from './phone-store';
import { packsRefreshed } from './phone-sync';
import { SCOPE, WORKER } from './site-worker';

/** On whichever page the crew looks where there is signal: what they build from is kept, and so is the program. */
const keep = async () => {
  try {
    if (import.meta.env.PROD) {
      await navigator.serviceWorker?.register(WORKER, { scope: SCOPE });
    }
    const store = await openPhoneStore();
    await packsRefreshed(store);
    store.close();
  } catch {
    // The phone's own page says what cannot be kept, and why.
  }
};
if (typeof requestIdleCallback === 'function') requestIdleCallback(() => void keep());
else setTimeout(() => void keep(), 2000);
