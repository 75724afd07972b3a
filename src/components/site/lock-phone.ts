import { lockPhone } from './phone-lock';
import { openPhoneStore } from './phone-store';

/** On the pages where somebody signs in: nobody is signed in while they are shown, so the phone is nobody's. */
const lock = async () => {
  try {
    const store = await openPhoneStore();
    await lockPhone(store);
    store.close();
    new BroadcastChannel('evenlay:site').postMessage('changed');
  } catch {
    // Nothing was kept where nothing can be.
  }
};
void lock();
