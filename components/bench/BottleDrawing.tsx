import type { BottleKind } from '@/lib/core/bottling/bottles';

/** Outline of each bottle in a box of 30 by 76, and what closes it. */
const OUTLINES: Record<BottleKind, { body: string; top: string }> = {
  beer: { body: 'M12 9v15c0 4-5 6-5 12v35c0 2 1 3 3 3h10c2 0 3-1 3-3V36c0-6-5-8-5-12V9', top: 'M11 5h8v4h-8Z' },
  heavy_beer: { body: 'M12 10v9c0 6-6 7-6 14v38c0 2 1 3 3 3h12c2 0 3-1 3-3V33c0-7-6-8-6-14v-9', top: 'M11 6h8v4h-8Z' },
  swing_top: { body: 'M12 12v10c0 5-5 7-5 13v36c0 2 1 3 3 3h10c2 0 3-1 3-3V35c0-6-5-8-5-13V12', top: 'M12 12V8c0-2 6-2 6 0v4M10 9v8M20 9v8' },
  sparkling_wine: { body: 'M12.5 8v14c0 8-6.5 10-6.5 20v29c0 2 1 3 3 3h3c1-3 5-3 6 0h3c2 0 3-1 3-3V42c0-10-6.5-12-6.5-20V8', top: 'M11 8c0-5 8-5 8 0M11 12h8' },
  still_wine: { body: 'M12.5 6v20c0 3-5.5 4-5.5 9v36c0 2 1 3 3 3h10c2 0 3-1 3-3V35c0-5-5.5-6-5.5-9V6', top: 'M12.5 6V3h5v3' },
  odd_glass: { body: 'M12 10v12H5v49c0 2 1 3 3 3h14c2 0 3-1 3-3V22h-7V10', top: 'M11 6h8v4h-8Z' },
  pet: { body: 'M12 9v4c0 6-6 7-6 14v6l2 4-2 4v30c0 2 1 3 3 3l3-3h6l3 3c2 0 3-1 3-3V41l-2-4 2-4v-6c0-7-6-8-6-14V9', top: 'M11 4h8v5h-8Z' },
  keg: { body: 'M4 16v53c0 3 3 5 6 5h10c3 0 6-2 6-5V16c0-3-3-5-6-5H10c-3 0-6 2-6 5', top: 'M9 11V6h12v5M4 24h22M4 62h22' },
};

/** A bottle; filled with the drink where it is on the bench. */
export function BottleDrawing({ kind, filled, height = 68 }: { kind: BottleKind; filled: boolean; height?: number }) {
  const { body, top } = OUTLINES[kind];
  return (
    <svg viewBox="0 0 30 78" height={height} width={(height * 30) / 78} aria-hidden fill="none" stroke="currentColor" strokeWidth="1.6" strokeLinejoin="round" className="shrink-0 text-ink">
      <path d={body} fill={filled ? 'var(--drink-fill)' : 'var(--glass)'} />
      <path d={top} />
    </svg>
  );
}
