'use client';

import { useEffect, useId, useRef, useState, type ReactNode } from 'react';

export const MENU_ITEM = 'type-label flex min-h-11 w-full items-center px-4 text-left text-ink no-underline hover:bg-desk focus-visible:-outline-offset-2 strip:min-h-9';

/** A button that shows a short list below it; Escape, a press elsewhere and leaving it by keyboard put it away. */
export function Menu({ word, label, className = '', children }: { word: ReactNode; label?: string; className?: string; children: (close: () => void) => ReactNode }) {
  const [open, setOpen] = useState(false);
  const id = useId();
  const root = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);

  useEffect(() => {
    if (!open) return;
    const outside = (event: PointerEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false);
    };
    document.addEventListener('pointerdown', outside);
    return () => document.removeEventListener('pointerdown', outside);
  }, [open]);

  return (
    <div
      ref={root}
      className="relative min-w-0"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !open) return;
        setOpen(false);
        button.current?.focus();
      }}
      onBlur={(event) => {
        if (!root.current?.contains(event.relatedTarget)) setOpen(false);
      }}
    >
      <button ref={button} type="button" aria-expanded={open} aria-controls={id} aria-label={label} onClick={() => setOpen(!open)} className={`type-label min-h-8 max-w-full ${className}`}>
        {word}
      </button>
      {open && (
        <div id={id} className="absolute right-0 top-full z-30 min-w-52 max-w-[calc(100vw-2*var(--margin))] border-[1.5px] border-ink bg-lit py-1">
          {children(() => setOpen(false))}
        </div>
      )}
    </div>
  );
}
