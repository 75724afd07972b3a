import { useState } from 'react';
import type { Display } from '@/paving/length';

/** Whose tape reads in what is the phone's own affair: kept on it, whatever the plan was drawn in. */
const KEY = 'evenlay:site-display';

const chosen = (): Display | null => {
  try {
    const value = localStorage.getItem(KEY);
    return value === 'metric' || value === 'imperial' ? value : null;
  } catch {
    return null;
  }
};

export const useShownIn = (drawnIn: Display): [Display, () => void] => {
  const [display, setDisplay] = useState<Display>(() => chosen() ?? drawnIn);
  const change = () => {
    const next = display === 'metric' ? 'imperial' : 'metric';
    setDisplay(next);
    try {
      localStorage.setItem(KEY, next);
    } catch {
      // For this page only, then.
    }
  };
  return [display, change];
};
