import { useMemo } from 'react';
import type { LayoutDocument } from '@/paving/layout-document';
import { floorThumbnailSvg } from '@/sheets/floor-thumbnail';

/** A small drawing of a floor, as wide as its place. */
export function FloorDrawing({
  document,
  width,
  height,
  className = '',
}: {
  document: LayoutDocument;
  width: number;
  height: number;
  className?: string;
}) {
  const svg = useMemo(() => floorThumbnailSvg(document, width, height), [document, width, height]);
  return (
    <span
      aria-hidden="true"
      className={`block [&_svg]:h-auto [&_svg]:w-full ${className}`}
      dangerouslySetInnerHTML={{ __html: svg }}
    />
  );
}
