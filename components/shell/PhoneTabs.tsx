'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { isHere, MORE, type Place } from './places';

/** The phone's tabs, each with its word; under the thumb. */
export function PhoneTabs({ places }: { places: readonly Place[] }) {
  const path = usePathname();
  return (
    <nav aria-label="Main" className="fixed inset-x-0 bottom-0 z-20 flex border-t-[1.5px] border-ink bg-sheet pb-[env(safe-area-inset-bottom)] strip:hidden">
      {[...places.filter((place) => place.tab), MORE].map((place) => {
        const here = isHere(place, path);
        const Icon = place.icon;
        return (
          <Link
            key={place.href}
            href={place.href}
            aria-current={here ? 'page' : undefined}
            className={`type-label relative flex min-h-14 min-w-0 flex-1 flex-col text-[min(0.75rem,15px)]! items-center justify-center gap-0.5 pt-1 no-underline ${here ? 'text-ink before:absolute before:inset-x-[14%] before:top-0 before:h-1 before:bg-ink' : 'text-ink2'}`}
            style={{ fontWeight: here ? 700 : 500 }}
          >
            <span className="relative">
              <Icon />
              {place.count ? (
                <span className="absolute -top-1.5 left-[17px] min-w-[15px] bg-madder px-1 text-center text-[11px] font-semibold leading-[15px] text-on">
                  <span className="heard-only">, </span>
                  {place.count}
                  <span className="heard-only"> open</span>
                </span>
              ) : null}
            </span>
            {place.name}
          </Link>
        );
      })}
    </nav>
  );
}
