/** The look's tokens as canvas colours, read from the page's CSS variables for the theme in force. */
export interface DrawingColours {
  readonly graphite: string;
  readonly slate: string;
  readonly stone50: string;
  readonly stone100: string;
  readonly stone300: string;
  readonly line: string;
  readonly onLine: string;
  readonly vial: string;
  readonly amber: string;
  readonly brick: string;
  /** The same, for marks over units and aggregate: those are as pale at dusk as by day. */
  readonly onFloor: {
    readonly graphite: string;
    readonly vial: string;
    readonly amber: string;
    readonly brick: string;
  };
}

export function drawingColours(): DrawingColours {
  const style = getComputedStyle(document.documentElement);
  const token = (name: string) => style.getPropertyValue(`--${name}`).trim() || '#000000';
  return {
    graphite: token('graphite'),
    slate: token('slate'),
    stone50: token('stone-50'),
    stone100: token('stone-100'),
    stone300: token('stone-300'),
    line: token('line'),
    onLine: token('on-line'),
    vial: token('vial'),
    amber: token('amber'),
    brick: token('brick'),
    onFloor: {
      graphite: token('graphite-on-floor'),
      vial: token('vial-on-floor'),
      amber: token('amber-on-floor'),
      brick: token('brick-on-floor'),
    },
  };
}

/** What a unit and the aggregate look like when the document does not say. */
export const PLAIN_UNIT = '#e9e4d8';
export const PLAIN_AGGREGATE = '#d9c8a2';

/** A colour `#rrggbb` made lighter (amount > 0) or darker (< 0), amount in [-1, 1]. */
export function colourShaded(hex: string, amount: number): string {
  const to = amount > 0 ? 255 : 0;
  const part = (at: number) => {
    const value = parseInt(hex.slice(at, at + 2), 16);
    return Math.round(value + (to - value) * Math.abs(amount))
      .toString(16)
      .padStart(2, '0');
  };
  return `#${part(1)}${part(3)}${part(5)}`;
}
