import { useVirtualizer, type VirtualItem, type Virtualizer } from '@tanstack/react-virtual';
import { type RefObject, useCallback, useEffect, useState } from 'react';
import { flushSync } from 'react-dom';
import type { LadderRow } from './rows';

export const DENSITIES = ['desk', 'bench'] as const;
export type Density = (typeof DENSITIES)[number];

/** Heights of a row with a reading, one without and the head, in rem, as `ladder.css` has them. */
const HEIGHTS: Record<Density, { reading: number; bare: number }> = {
  desk: { reading: 2.5, bare: 1.75 },
  bench: { reading: 3.5, bare: 2.25 },
};
const HEAD_REM = 3.25;

/** Pixels of one rem, once the page is there to ask. */
function useRem(): number {
  const [rem, setRem] = useState(16);
  useEffect(() => {
    const size = Number.parseFloat(getComputedStyle(document.documentElement).fontSize);
    if (size > 0) setRem(size);
  }, []);
  return rem;
}

/** True while the page is being printed: then every row is drawn, not only those in sight. */
function usePrinting(): boolean {
  const [printing, setPrinting] = useState(false);
  useEffect(() => {
    const before = (): void => flushSync(() => setPrinting(true));
    const after = (): void => setPrinting(false);
    addEventListener('beforeprint', before);
    addEventListener('afterprint', after);
    return () => {
      removeEventListener('beforeprint', before);
      removeEventListener('afterprint', after);
    };
  }, []);
  return printing;
}

export interface RowsWindow {
  readonly virtualizer: Virtualizer<HTMLElement, Element>;
  /** Rows to draw, and the empty space above and below them in pixels. */
  readonly items: readonly Pick<VirtualItem, 'index'>[];
  readonly above: number;
  readonly below: number;
}

/** Which rows of the ladder are in sight of its scrolling frame. */
export function useRowsWindow(
  frame: RefObject<HTMLElement | null>,
  rows: readonly LadderRow[],
  density: Density,
): RowsWindow {
  const rem = useRem();
  const printing = usePrinting();
  const heights = HEIGHTS[density];
  // Kept from one drawing to the next: new functions would have all rows measured again at every scroll.
  const estimateSize = useCallback(
    (index: number) => (rows[index]?.judged ? heights.reading : heights.bare) * rem,
    [rows, heights, rem],
  );
  const getItemKey = useCallback((index: number) => rows[index]?.seq ?? index, [rows]);
  const virtualizer = useVirtualizer<HTMLElement, Element>({
    count: rows.length,
    getScrollElement: () => frame.current,
    estimateSize,
    getItemKey,
    overscan: 6,
    // The server draws what a frame of this height shows.
    initialRect: { width: 0, height: 640 },
    scrollPaddingEnd: HEAD_REM * rem,
  });
  useEffect(() => {
    if (rem !== 16) virtualizer.measure();
  }, [rem, virtualizer]);
  if (printing) return { virtualizer, items: rows.map((_, index) => ({ index })), above: 0, below: 0 };
  const items = virtualizer.getVirtualItems();
  return {
    virtualizer,
    items,
    above: items[0]?.start ?? 0,
    below: virtualizer.getTotalSize() - (items.at(-1)?.end ?? 0),
  };
}
