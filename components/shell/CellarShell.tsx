'use client';

import { usePathname } from 'next/navigation';
import { useSyncExternalStore, type ReactNode } from 'react';
import { Keeper } from '@/components/offline/Keeper';
import { Haze } from '@/components/ui/Haze';
import { readIn } from '@/components/ui/units';
import { useAlerts } from '@/lib/client/alerts';
import { useLiveChanges } from '@/lib/client/use-live-changes';
import { USUAL_UNITS, type ChosenUnits } from '@/lib/core/units/chosen';
import { Header } from './Header';
import { LeftBar } from './LeftBar';
import { OfflineBar } from './OfflineBar';
import { PhoneTabs } from './PhoneTabs';
import { SignOutBar } from './SignOutBar';
import { placesFor } from './places';
import { useBelonging } from './use-belonging';
import { useGlance } from './use-glance';

const inWords = (units: ChosenUnits) => Object.values(units).join(' ');

const nothing = () => () => undefined;
const useInBrowser = () => useSyncExternalStore(nothing, () => true, () => false);

/** What stands around every page of a cellar: head, tabs, and the line that keeps the page new. */
export function CellarShell({ units, children }: { units: ChosenUnits; children: ReactNode }) {
  const live = useLiveChanges();
  useBelonging();
  const glance = useGlance(units);
  const { counts } = useAlerts(glance.may('alerts.read') ? { state: 'open', limit: 100 } : null);
  // The settings show no figures, and a choice made there must not throw the page away.
  const drawnFor = usePathname().startsWith('/settings') ? 'settings' : inWords(glance.units);
  // The server draws in the usual units; to draw its page anew in others would lose what was typed meanwhile.
  const drawn = useInBrowser() || drawnFor === 'settings' || drawnFor === inWords(USUAL_UNITS);
  readIn(glance.units);
  const places = placesFor(glance.may, counts?.open ?? 0);
  return (
    <>
      <a href="#page" className="type-label absolute -top-24 left-2 z-40 border-[1.5px] border-ink bg-lit px-3 py-2 text-ink focus:top-2">
        Past the head of the page
      </a>
      <Header glance={glance} places={places} />
      <OfflineBar live={live} timeZone={glance.timeZone} />
      <LeftBar />
      <SignOutBar />
      <main key={drawnFor} id="page" tabIndex={-1} className="pb-20 outline-none strip:pb-0 print:pb-0">
        {drawn ? children : <Haze height={240} className="mx-(--margin) mt-5" />}
      </main>
      <PhoneTabs places={places} />
      <Keeper />
    </>
  );
}
