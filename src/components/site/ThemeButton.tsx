import { Moon, Sun } from 'lucide-react';
import { useEffect, useState } from 'react';

interface Theme {
  get(): 'day' | 'dusk';
  set(next: 'day' | 'dusk'): void;
}
const theme = (): Theme | undefined => (window as unknown as { evenlayTheme?: Theme }).evenlayTheme;

/** From day to dusk and back: black on white for the sun, light on dark for the end of the day. */
export function ThemeButton() {
  const [now, setNow] = useState(() => theme()?.get() ?? 'day');
  useEffect(() => {
    const read = () => setNow(theme()?.get() ?? 'day');
    window.addEventListener('evenlay:theme', read);
    return () => window.removeEventListener('evenlay:theme', read);
  }, []);
  const next = now === 'day' ? 'dusk' : 'day';
  return (
    <button
      type="button"
      className="button button-quiet min-w-11"
      aria-label={next === 'dusk' ? 'Dusk colours' : 'Day colours'}
      onClick={() => theme()?.set(next)}
    >
      {next === 'dusk' ? <Moon size={20} aria-hidden /> : <Sun size={20} aria-hidden />}
    </button>
  );
}
