import { useState } from 'react';
import { compareLink, type CompareView } from './compare-link';

/** Puts the address of just this comparison on the clipboard, or shows it where that is not allowed. */
export function CopyLink({ a, b, view }: { a: string; b: string; view: CompareView }) {
  const [said, setSaid] = useState('');
  const link = () => new URL(compareLink(a, b, view), window.location.href).href;
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(link());
      setSaid('Link copied. Whoever may see both versions can open it.');
    } catch {
      setSaid(`Copy this link: ${link()}`);
    }
  };
  return (
    <>
      <span role="status" className="max-w-72 text-sm break-words text-slate empty:hidden">
        {said}
      </span>
      <button type="button" className="button" onClick={() => void copy()}>
        Copy the link
      </button>
    </>
  );
}
