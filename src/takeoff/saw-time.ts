import { formatCount } from '@/paving/count';

const MINUTES_PER_HOUR = 60;
const THIN = '\u202f';

/** Minutes as people say them: `under a minute`, `45 min`, `3 h 20 min`. */
export function formatMinutes(minutes: number): string {
  const whole = Math.round(minutes);
  if (minutes === 0) return `0${THIN}min`;
  if (whole < 1) return 'under a minute';
  const [hours, rest] = [Math.floor(whole / MINUTES_PER_HOUR), whole % MINUTES_PER_HOUR];
  if (hours === 0) return `${rest}${THIN}min`;
  return rest === 0
    ? `${formatCount(hours)}${THIN}h`
    : `${formatCount(hours)}${THIN}h ${rest}${THIN}min`;
}

/** The same of hours. */
export const formatHours = (hours: number): string => formatMinutes(hours * MINUTES_PER_HOUR);
