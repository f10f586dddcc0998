import type { ReactNode } from 'react';
import type { LogKind } from './log';

const DRAWN: Record<LogKind, ReactNode> = {
  // a hydrometer: bulb and stem
  reading: <path d="M10 1.5v7M8.2 4h3.6M10 8.5c-2 1-2.6 3-2.6 4.6 0 2.4 1 5 2.6 5s2.6-2.6 2.6-5c0-1.6-.6-3.6-2.6-4.600Z" />,
  // a beaker poured from
  pitch: <path d="M4 3.500h12l-1.6 13h-8.800ZM5 8.500h10M10 11v4M8 13h4" />,
  observation: <path d="M2 10s3-5 8-5 8 5 8 5-3 5-8 5-8-5-8-5ZM10 12.300a2.3 2.3 0 1 0 0-4.6 2.3 2.3 0 0 0 0 4.600Z" />,
  note: <path d="M4 2.500h8.500L16 6v11.500H4ZM7 8.500h6M7 11.500h6M7 14.500h3.5" />,
  // an airlock's bend
  neck: <path d="M8 18v-7.500h-2.500V5M10.5 18v-5.500c0-2 3.5-2 3.5 0M14 12.500V5M3.5 3.500h4M12 3.500h4" />,
  // from one vessel down into another
  rack: <path d="M2.5 3h5v5h-5ZM12.5 12h5v5h-5ZM5 5.500v0M5 3V1.500h10V12" />,
  addition: <path d="M10 3v14M3 10h14" />,
  top_up: <path d="M5 8v9.500h10V8M10 2v8.500M7 7.500l3 3 3-3" />,
  stabilise: <path d="M6 9V6a4 4 0 0 1 8 0v3M4 9h12v8.500H4Z" />,
  // a drop into a vessel, and what falls
  fining: <path d="M10 1.500c1.6 2 2.400 3.300 2.400 4.400a2.400 2.400 0 0 1-4.800 0c0-1.100.8-2.400 2.400-4.400ZM4 11v6.500h12V11M6.500 15.500h7" />,
  // one into two, two into one
  split: <path d="M10 2.500v5M10 7.500 4.500 13v4.500M10 7.500l5.500 5.500v4.500" />,
  blend: <path d="M4.500 2.500V7l5.500 5.500L15.500 7V2.500M10 12.500v5" />,
  // a bottle
  bottling: <path d="M8.200 2h3.600v5c1.800 1 2.700 2.400 2.700 4v7h-9v-7c0-1.600.9-3 2.700-4Z" />,
  // a line set aside
  overrule: <path d="M2.500 10h4M13.500 10h4M6.500 15.500l7-11" />,
  // the program's own line
  call: <path d="M1.5 10.500h4l2-6 4 11 2.2-5h4.8" />,
};

/** What kind of line it is; a word stands beside it for those who hear the page. */
export function LogIcon({ kind }: { kind: LogKind }) {
  return (
    <svg viewBox="0 0 20 20" width="17" height="17" aria-hidden fill="none" stroke="currentColor" strokeWidth="1.6" strokeLinejoin="round" className="shrink-0">
      {DRAWN[kind]}
    </svg>
  );
}

export const LOG_KIND_WORDS: Record<LogKind, string> = {
  reading: 'Reading',
  pitch: 'Pitch',
  observation: 'Seen',
  note: 'Note',
  neck: 'Neck',
  rack: 'Racking',
  addition: 'Addition',
  top_up: 'Topping up',
  stabilise: 'Stabilising',
  fining: 'Fining',
  split: 'Split',
  blend: 'Blend',
  bottling: 'Bottling',
  overrule: 'Overruled',
  call: 'Call',
};
