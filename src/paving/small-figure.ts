/** A cubic millimetre in m³, far under any figure that matters: less is the noise of adding up, and is nought. */
const LEAST_FIGURE = 1e-9;
/** How many figures of a small value are kept. */
const SIGNIFICANT = 3;

/**
 * A value to `decimals` places, but one under `smallBelow` to three significant figures without
 * trailing noughts, so that it does not read as nought: `31.21`, `0.0456`, `0.0006`.
 */
export function smallFigure(value: number, decimals: number, smallBelow: number): string {
  const size = Math.abs(value);
  if (size < LEAST_FIGURE) return (0).toFixed(decimals);
  if (size >= smallBelow) return value.toFixed(decimals);
  const places = SIGNIFICANT - 1 - Math.floor(Math.log10(size));
  const figures = value.toFixed(places).replace(/0+$/, '');
  const shown = figures.length - figures.indexOf('.') - 1;
  return shown < decimals ? value.toFixed(decimals) : figures;
}
