import type { ReactNode } from 'react';

const Flag = ({ children }: { children: string }) => <span className="inline-block min-w-[13px] bg-ink px-[3px] text-center text-[0.6875rem] font-semibold leading-[13px] text-on">{children}</span>;

const ENTRIES: readonly { mark: ReactNode; words: string }[] = [
  { mark: <Flag>P</Flag>, words: 'pitch' },
  { mark: <Flag>N</Flag>, words: 'addition' },
  { mark: <Flag>R</Flag>, words: 'racking' },
  { mark: <Flag>A</Flag>, words: 'airlock' },
  {
    mark: (
      <svg width="10" height="10" viewBox="0 0 10 10">
        <circle cx="5" cy="5" r="3.6" fill="var(--lit)" stroke="var(--ink)" strokeWidth="1.6" />
      </svg>
    ),
    words: 'hydrometer reading',
  },
  { mark: <span className="haze relative inline-block h-[10px] w-[22px] after:absolute after:inset-x-0 after:top-[4px] after:border-t-[1.5px] after:border-dashed after:border-ink" />, words: 'forecast, 8 in 10' },
  { mark: <span className="inline-block h-[5px] w-[22px] bg-ink" />, words: 'likely end' },
  {
    mark: (
      <svg width="38" height="10" viewBox="0 0 38 10">
        <path d="M0 0h38v10H0Z" fill="var(--range)" />
        <path d="M0 6c5-4 9 2 14 0s8-4 13-1 7 2 11-1" fill="none" stroke="var(--mercury)" strokeWidth="1.6" />
      </svg>
    ),
    words: 'temperature in its range',
  },
];

/** One line that says what the marks are. */
export function ShelfKey() {
  return (
    <div aria-hidden className="type-label hidden min-h-[30px] flex-wrap items-center gap-x-6 gap-y-1 px-(--margin) py-1.5 text-ink2 strip:flex">
      {ENTRIES.map((entry) => (
        <span key={entry.words} className="inline-flex items-center gap-2">
          {entry.mark}
          {entry.words}
        </span>
      ))}
    </div>
  );
}
