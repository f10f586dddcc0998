interface SpreadProps {
  /** What it is, for those who hear the page. */
  name: string;
  lo: number;
  value: number;
  hi: number;
  from: number;
  to: number;
  /** As the ends of the scale are written. */
  write: (value: number) => string;
}

/** One number with its doubt on a scale: haze from the least to the most, a post at the likely. */
export function Spread({ name, lo, value, hi, from, to, write }: SpreadProps) {
  const at = (number: number) => Math.min(100, Math.max(0, (100 * (number - from)) / (to - from)));
  return (
    <div role="img" aria-label={`${name}: ${write(value)}, from ${write(lo)} to ${write(hi)}`} className="font-mono">
      <div className="relative h-[18px]" aria-hidden>
        <span className="absolute inset-x-0 bottom-0 h-px bg-ink2" />
        <span className="haze absolute bottom-0 top-1 min-w-px" style={{ left: `${at(lo)}%`, width: `${at(hi) - at(lo)}%` }} />
        <span className="absolute bottom-0 top-0 w-[2px] -translate-x-1/2 bg-ink" style={{ left: `${at(value)}%` }} />
      </div>
      <div className="type-tick flex justify-between text-ink2" aria-hidden>
        <span>{write(from)}</span>
        <span>{write(to)}</span>
      </div>
    </div>
  );
}
