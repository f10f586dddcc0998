'use client';

import Link from 'next/link';
import { chooseCellar } from '@/lib/client/me';
import { Menu, MENU_ITEM } from './Menu';
import type { CellarGlance } from './use-glance';

/** Which cellar is shown; a person of several changes it here. `words` is the cellar's name with what stands beside it. */
export function CellarMenu({ glance, words }: { glance: CellarGlance; words: string | null }) {
  if (glance.cellars.length < 2) return <span className="block truncate">{words}</span>;
  return (
    <Menu
      label={`${words ?? ''}. Show another cellar`}
      className="inline-flex items-center gap-1.5 text-ink2 hover:text-ink max-strip:min-h-6!"
      word={
        <>
          <span className="truncate">{words}</span>
          <svg viewBox="0 0 12 12" width="10" height="10" aria-hidden className="shrink-0">
            <path d="m2 4 4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.8" />
          </svg>
        </>
      }
    >
      {(close) => (
        <>
          {glance.cellars.map((cellar) => (
            <button key={cellar.id} type="button" aria-pressed={cellar.id === glance.cellarId} className={MENU_ITEM} onClick={() => void chooseCellar(cellar.id).then(close)}>
              <span className="w-5 shrink-0" aria-hidden>
                {cellar.id === glance.cellarId ? '●' : '○'}
              </span>
              <span className="min-w-0 break-words">{cellar.name}</span>
            </button>
          ))}
          <Link href="/settings/cellar" className={`${MENU_ITEM} border-t`} onClick={close}>
            Cellars
          </Link>
        </>
      )}
    </Menu>
  );
}
