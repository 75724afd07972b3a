import { useMemo } from 'react';
import { boxRing, type DrawCommand } from '@/sheets/drawing';
import { PAPER } from '@/sheets/inks';
import { drawingSvg } from '@/sheets/svg-sink';

/** A drawing of the sheets on the screen, on paper of its own; `width` and `height` in paper mm. */
export function SheetPicture({
  commands,
  width,
  height,
  label,
}: {
  readonly commands: readonly DrawCommand[];
  readonly width: number;
  readonly height: number;
  readonly label: string;
}) {
  const svg = useMemo(() => {
    const sheet: DrawCommand = {
      kind: 'path',
      rings: [boxRing({ left: 0, top: 0, right: width, bottom: height })],
      fill: PAPER,
    };
    return drawingSvg({
      width,
      height,
      layers: [{ name: 'picture', commands: [sheet, ...commands] }],
    });
  }, [commands, width, height]);
  return (
    <div
      role="img"
      aria-label={label}
      className="border border-stone-300 [&_svg]:block [&_svg]:h-auto [&_svg]:w-full"
      dangerouslySetInnerHTML={{ __html: svg }}
    />
  );
}
