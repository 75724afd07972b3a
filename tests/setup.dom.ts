import { cleanup } from '@testing-library/react';
import { afterEach } from 'vitest';
import './setup.node';

// jsdom has no canvas: drawing calls do nothing, measuring calls answer with plain figures.
const context = new Proxy({} as Record<string | symbol, unknown>, {
  get(target, key) {
    if (key in target) return target[key];
    if (key === 'measureText') return (text: string) => ({ width: text.length * 6 });
    if (key === 'getImageData') return () => ({ data: new Uint8ClampedArray(4) });
    if (key === 'createPattern') return () => ({ setTransform() {} });
    return () => undefined;
  },
  set(target, key, value) {
    target[key] = value;
    return true;
  },
});
HTMLCanvasElement.prototype.getContext = (() => context) as never;

afterEach(cleanup);
