'use client';

import { useId, type ReactNode } from 'react';

function Square({ ticked, notYet }: { ticked: boolean; notYet: boolean }) {
  return (
    <svg viewBox="0 0 20 20" width="20" height="20" aria-hidden className="shrink-0 text-ink">
      <rect x="0.75" y="0.75" width="18.5" height="18.5" fill="var(--lit)" stroke="currentColor" strokeWidth="1.5" strokeDasharray={notYet ? '2.6 2.2' : undefined} />
      {ticked && <path d="m4.6 10.4 3.7 3.7 7-8.2" fill="none" stroke="currentColor" strokeWidth="2" pathLength={1} className="tick-drawn" />}
    </svg>
  );
}

interface BoxProps {
  ticked: boolean;
  onTick: (ticked: boolean) => void;
  /** Dashed: it cannot be ticked yet. */
  notYet?: boolean;
  disabled?: boolean;
  /** What is ticked, for those who hear the page, where no label is drawn. */
  label?: string;
  children?: ReactNode;
  className?: string;
}

/** A box to tick: open, ticked or dashed. The target is 44 px on phones. */
export function Box({ ticked, onTick, notYet = false, disabled = false, label, children, className = '' }: BoxProps) {
  const id = useId();
  return (
    <label htmlFor={id} className={`relative inline-flex max-w-full items-start gap-3 max-strip:min-h-11 max-strip:min-w-11 ${className}`}>
      <input
        id={id}
        type="checkbox"
        checked={ticked}
        disabled={disabled || notYet}
        aria-label={label}
        onChange={(event) => onTick(event.target.checked)}
        className="peer absolute left-0 top-0 h-5 w-5 cursor-pointer appearance-none focus-visible:outline-offset-4 disabled:cursor-not-allowed"
      />
      <span className="pointer-events-none">
        <Square ticked={ticked} notYet={notYet} />
      </span>
      {children}
    </label>
  );
}
