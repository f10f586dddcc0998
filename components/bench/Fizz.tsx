'use client';

/** What a person would call it, and the volumes that are usual for it. */
const USUAL: readonly { volumes: number; name: string }[] = [
  { volumes: 2, name: 'lightly sparkling' },
  { volumes: 2.8, name: 'sparkling' },
];
const [BOTTOM, TOP, STEP] = [1, 4, 0.1];
const TICKS = Array.from({ length: 7 }, (_, index) => BOTTOM + index / 2);
const WORDS: Record<number, string> = { 1: 'faint', 2: 'light', 3: 'lively', 4: 'hard' };
/** Half the handle of a slider, px: the ends of its way. */
const INSET = 9;

const share = (volumes: number): number => Math.min(1, Math.max(0, (volumes - BOTTOM) / (TOP - BOTTOM)));
const place = (volumes: number): string => `calc(${INSET}px + (100% - ${2 * INSET}px) * ${share(volumes).toFixed(4)})`;

/** How much gas is wanted, on a ruler; the browser's own slider lies over the drawing and does the work. */
export function Fizz({ volumes, onChange }: { volumes: number; onChange: (volumes: number) => void }) {
  return (
    <div className="flex flex-col gap-1">
      <label htmlFor="fizz" className="type-label flex justify-between gap-3 text-ink2">
        wanted fizz <span className="font-semibold text-ink">{volumes.toFixed(1)} volumes</span>
      </label>
      <div className="relative h-11 strip:h-8">
        <input
          id="fizz"
          type="range"
          min={BOTTOM}
          max={TOP}
          step={STEP}
          value={volumes}
          onChange={(event) => onChange(Number(event.target.value))}
          aria-valuetext={`${volumes.toFixed(1)} volumes`}
          className="peer absolute inset-0 z-10 h-full w-full cursor-pointer opacity-0"
        />
        <div aria-hidden className="pointer-events-none absolute inset-0 rounded-[2px] peer-focus-visible:outline-2 peer-focus-visible:outline-mercury">
          <span className="absolute top-1/2 h-px bg-ink2" style={{ left: INSET, right: INSET }} />
          <span className="absolute top-1/2 h-[5px] -translate-y-1/2 bg-ink" style={{ left: INSET, width: `calc((100% - ${2 * INSET}px) * ${share(volumes).toFixed(4)})` }} />
          {TICKS.map((tick) => (
            <span key={tick} className="absolute top-1/2 h-3 w-px -translate-y-1/2 bg-ink2" style={{ left: place(tick) }} />
          ))}
          <svg width="18" height="24" viewBox="0 0 18 24" className="absolute top-1/2 -translate-x-1/2 -translate-y-1/2" style={{ left: place(volumes) }}>
            <path d="M1.5 1.5h15v14.5L9 22.5 1.5 16Z" fill="var(--ink)" stroke="var(--desk)" strokeWidth="1.5" />
          </svg>
        </div>
      </div>
      <div aria-hidden className="type-tick flex justify-between text-ink2">
        {Object.entries(WORDS).map(([at, word]) => (
          <span key={at}>
            {word} {at}
          </span>
        ))}
      </div>
      <div className="flex flex-wrap gap-2 pt-1">
        {USUAL.map((usual) => (
          <button key={usual.name} type="button" aria-pressed={volumes === usual.volumes} onClick={() => onChange(usual.volumes)} className={`type-label min-h-11 rounded border px-3 strip:min-h-[30px] ${volumes === usual.volumes ? 'border-ink bg-ink text-on' : 'border-ink3 text-ink hover:bg-desk'}`}>
            {usual.name} {usual.volumes.toFixed(1)}
          </button>
        ))}
      </div>
    </div>
  );
}
