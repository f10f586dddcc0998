'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { dayName, clock } from '@/components/charts/zone';
import { useNow } from '@/components/ui/now';
import { Wordmark } from '@/components/ui/Mark';
import { DayNightIcon } from '@/components/ui/icons';
import { chooseTheme, useTheme } from '@/components/ui/theme';
import { CellarMenu } from './CellarMenu';
import { isHere, type Place } from './places';
import { PersonMenu } from './PersonMenu';
import type { CellarGlance } from './use-glance';

/** Day, night, and back: by hand. By the clock is chosen in the settings. */
function DayNight() {
  const { theme, choice } = useTheme();
  const word = choice === 'clock' ? `${theme === 'night' ? 'Night' : 'Day'}, by clock` : theme === 'night' ? 'Night' : 'Day';
  return (
    <button
      type="button"
      onClick={() => chooseTheme(theme === 'night' ? 'day' : 'night')}
      aria-label={`${word}. Change to ${theme === 'night' ? 'day' : 'night'}`}
      className="type-label inline-flex min-h-8 items-center gap-2 text-ink2 hover:text-ink"
    >
      <DayNightIcon night={theme === 'night'} />
      {word}
    </button>
  );
}

export function NavLinks({ places }: { places: readonly Place[] }) {
  const path = usePathname();
  return (
    <nav aria-label="Main" className="flex flex-wrap gap-x-4 self-stretch wide:gap-x-[22px]">
      {places.map((place) => {
        const here = isHere(place, path);
        return (
          <Link
            key={place.href}
            href={place.href}
            aria-current={here ? 'page' : undefined}
            className={`relative flex items-center whitespace-nowrap font-mono text-[0.8125rem] no-underline ${here ? 'text-ink after:absolute after:inset-x-0 after:bottom-0 after:h-1 after:bg-ink' : 'text-ink2 hover:text-ink'}`}
            style={{ fontWeight: here ? 600 : 500 }}
          >
            {place.name}
            {place.count ? <span className="pl-[0.6em] font-semibold text-madder">{place.count}</span> : null}
          </Link>
        );
      })}
    </nav>
  );
}

/** The sheet's head: where one is, how the cellar stands, who is here. */
export function Header({ glance, places }: { glance: CellarGlance; places: readonly Place[] }) {
  const now = useNow();
  const path = usePathname();
  // A batch has its own head on a phone, with the way back to the shelf.
  const ownHead = /^\/batches\/[^/]+/.test(path) && path !== '/batches/new';
  const { cellar, vessels, heardAt, timeZone } = glance;
  const place = cellar && `${cellar}${vessels === null ? '' : ` · ${vessels} ${vessels === 1 ? 'vessel' : 'vessels'}`}`;
  return (
    <header className={`flex min-h-(--header) flex-wrap items-center gap-x-3 border-b-[1.5px] border-ink px-(--margin) ${ownHead ? 'max-strip:hidden' : ''}`}>
      <Link href="/shelf" className="no-underline" aria-label="Fallbright, to the shelf">
        <Wordmark />
      </Link>
      <div className="ml-[22px] hidden self-stretch strip:flex">
        <NavLinks places={places} />
      </div>
      <div className="type-label ml-auto hidden items-center gap-x-7 text-ink2 strip:flex">
        <div className={`max-w-[32ch] ${glance.cellars.length > 1 ? '' : 'hidden wide:block'}`}>
          <CellarMenu glance={glance} words={place} />
        </div>
        {heardAt !== null && <span className="hidden whitespace-nowrap wide:inline">sensors heard {clock(heardAt, timeZone)}</span>}
        <DayNight />
        <PersonMenu glance={glance} />
      </div>
      <div className="type-label ml-auto min-w-0 py-1 text-right text-ink2 strip:hidden" style={{ lineHeight: '1rem' }}>
        <div className="flex justify-end">
          <CellarMenu glance={glance} words={cellar && `${cellar}${vessels === null ? '' : `, ${vessels} ${vessels === 1 ? 'vessel' : 'vessels'}`}`} />
        </div>
        <div>{now !== null && `${dayName(now / 1000, timeZone)}, ${clock(now / 1000, timeZone)}`}</div>
      </div>
    </header>
  );
}
