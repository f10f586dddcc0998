import type { StateWord } from '@/lib/core/calls/attention';

const COLOUR: Record<StateWord, string> = {
  Stop: 'text-madder',
  Now: 'text-madder',
  Check: 'text-ochre',
  Silent: 'text-ink2',
  Due: 'text-ink',
  Ready: 'text-green',
  'In hand': 'text-ink',
  'Leave be': 'text-ink3',
  Done: 'text-green',
};

/** Parts of the shapes that are cut out of a filled one take the paper's colour. */
const PAPER = 'var(--lit)';

function Shape({ state }: { state: StateWord }) {
  switch (state) {
    case 'Stop':
      return (
        <>
          <path d="M5.7 1h6.6L17 5.7v6.6L12.3 17H5.7L1 12.3V5.7Z" fill="currentColor" />
          <path d="M5.2 9h7.6" stroke={PAPER} strokeWidth="2.6" />
        </>
      );
    case 'Now':
      return (
        <>
          <path d="M2.6 1v16" stroke="currentColor" strokeWidth="1.8" />
          <path d="M2.6 1.6 17 6.6 2.6 11Z" fill="currentColor" />
        </>
      );
    case 'Check':
      return <path d="M9 2.2 16.8 16H1.2ZM9 7v4M9 12.4v1.8" fill="none" stroke="currentColor" strokeWidth="1.7" strokeLinejoin="round" />;
    case 'Silent':
      return (
        <>
          <circle cx="9" cy="9" r="7.3" fill="none" stroke="currentColor" strokeWidth="1.8" strokeDasharray="3.6 2.13" strokeDashoffset="1.2" />
          <path d="M6 9h6" stroke="currentColor" strokeWidth="1.8" />
        </>
      );
    case 'Due':
      return (
        <>
          <circle cx="9" cy="9" r="7.3" fill="none" stroke="currentColor" strokeWidth="1.8" />
          <path d="M9 9V1.7A7.3 7.3 0 0 1 16.3 9Z" fill="currentColor" />
        </>
      );
    case 'Ready':
      return (
        <>
          <path d="M1.6 1.6h14.8v14.8H1.6Z" fill="currentColor" />
          <path d="m4.8 9.3 3 3 5.4-6.2" fill="none" stroke={PAPER} strokeWidth="1.9" />
        </>
      );
    case 'In hand':
      return (
        <>
          <circle cx="9" cy="9" r="7.3" fill="none" stroke="currentColor" strokeWidth="1.8" />
          <circle cx="9" cy="9" r="3.2" fill="currentColor" />
        </>
      );
    case 'Leave be':
      return <circle cx="9" cy="9" r="7.3" fill="none" stroke="currentColor" strokeWidth="1.6" />;
    case 'Done':
      return <path d="m2 9.8 4.6 4.7L16 3.6" fill="none" stroke="currentColor" strokeWidth="2.4" />;
  }
}

export const stateColour = (state: StateWord) => COLOUR[state];

/** The shape alone. It says nothing to those who hear the page: a word always stands beside it. */
export function StateMark({ state, size = 15, className = '' }: { state: StateWord; size?: number; className?: string }) {
  return (
    <svg viewBox="0 0 18 18" width={size} height={size} aria-hidden className={`shrink-0 ${COLOUR[state]} ${className}`}>
      <Shape state={state} />
    </svg>
  );
}

/** Shape and word. `word` replaces the state's own word where a screen names it more closely (`Not yet`, `Cleared`). */
export function State({ state, word = state, size = 15, className = '' }: { state: StateWord; word?: string; size?: number; className?: string }) {
  return (
    <span className={`type-label inline-flex items-center gap-2 font-semibold ${COLOUR[state]} ${className}`} style={{ fontWeight: 600 }}>
      <StateMark state={state} size={size} />
      {word}
    </span>
  );
}
