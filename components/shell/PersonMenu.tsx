'use client';

import Link from 'next/link';
import { useEffect, useId, useRef, useState } from 'react';
import { chooseCellar } from '@/lib/client/me';
import { signOut } from '@/lib/client/sign-in';
import type { CellarGlance } from './use-glance';

/** `Oriel Thatcher` → `Oriel T.` */
export function shortName(name: string): string {
  const [first, ...rest] = name.trim().split(/\s+/);
  const last = rest.at(-1);
  return last ? `${first} ${[...last][0]}.` : (first ?? '');
}

const ITEM = 'type-label flex min-h-9 w-full items-center px-4 text-left text-ink no-underline hover:bg-desk focus-visible:-outline-offset-2';

/** Behind the person's name: their cellars, the settings, the way out. */
export function PersonMenu({ glance }: { glance: CellarGlance }) {
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

  if (!glance.person) return null;
  return (
    <div
      ref={root}
      className="relative"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !open) return;
        setOpen(false);
        button.current?.focus();
      }}
      onBlur={(event) => {
        if (!root.current?.contains(event.relatedTarget)) setOpen(false);
      }}
    >
      <button ref={button} type="button" aria-expanded={open} aria-controls={id} onClick={() => setOpen(!open)} className="type-label min-h-8 text-ink" style={{ fontWeight: 600 }}>
        {shortName(glance.person)}
      </button>
      {open && (
        <div id={id} className="absolute right-0 top-full z-30 min-w-52 border-[1.5px] border-ink bg-lit py-1">
          {glance.cellars.length > 1 &&
            glance.cellars.map((cellar) => (
              <button key={cellar.id} type="button" aria-pressed={cellar.id === glance.cellarId} className={ITEM} onClick={() => void chooseCellar(cellar.id).then(() => setOpen(false))}>
                <span className="w-5" aria-hidden>
                  {cellar.id === glance.cellarId ? '●' : '○'}
                </span>
                {cellar.name}
              </button>
            ))}
          <Link href="/settings" className={`${ITEM} ${glance.cellars.length > 1 ? 'border-t' : ''}`} onClick={() => setOpen(false)}>
            Settings
          </Link>
          <button type="button" className={ITEM} onClick={() => void signOut()}>
            Sign out
          </button>
        </div>
      )}
    </div>
  );
}
