'use client';

import { useState, type ReactNode } from 'react';
import { Button, type ButtonSize } from './Button';

/** A button for what cannot be undone: asks once more, in place. */
export function Sure({ word, yes, no = 'Leave it', size = 'normal', busy, className, onSure, children }: { word: string; yes: string; no?: string; size?: ButtonSize; busy: boolean; className?: string; onSure: () => void; children?: ReactNode }) {
  const [asked, setAsked] = useState(false);
  if (!asked)
    return (
      <Button size={size} disabled={busy} className={className} onClick={() => setAsked(true)}>
        {word}
      </Button>
    );
  return (
    <span role="group" aria-label={word} className="inline-flex flex-wrap items-center gap-2">
      {children && <span className="type-reason text-ink2">{children}</span>}
      <Button
        size={size}
        look="final"
        disabled={busy}
        // The question took the place of the button: the way on starts here.
        autoFocus
        onClick={() => {
          setAsked(false);
          onSure();
        }}
      >
        {yes}
      </Button>
      <Button size={size} onClick={() => setAsked(false)}>
        {no}
      </Button>
    </span>
  );
}
