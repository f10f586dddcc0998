'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import type { ReactNode } from 'react';
import { BackIcon } from '@/components/ui/icons';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { useMe } from '@/lib/client/me';
import { sectionsFor, type Section } from './sections';

const GROUPS: readonly Section['of'][] = ['You', 'The cellar'];
const isHere = (section: Section, path: string) => path === section.href || path.startsWith(`${section.href}/`);

/** The way between the pages of the settings, at the side from 1100 px on and above them from 720. */
function Sections({ sections, path }: { sections: readonly Section[]; path: string }) {
  return (
    <nav aria-label="Settings" className="bg-desk max-strip:hidden max-wide:flex max-wide:flex-wrap max-wide:gap-x-5 max-wide:border-b-[1.5px] max-wide:border-ink max-wide:px-(--margin) wide:border-r-[1.5px] wide:border-ink">
      {GROUPS.map((group) => (
        <div key={group} className="max-wide:contents">
          <div className="max-wide:hidden">
            <GroupBar word={group} as="div" />
          </div>
          {sections
            .filter((section) => section.of === group)
            .map((section) => {
              const here = isHere(section, path);
              return (
                <Link
                  key={section.href}
                  href={section.href}
                  aria-current={here ? 'page' : undefined}
                  className={`relative flex min-h-10 items-center font-mono text-[0.8125rem] no-underline wide:border-b wide:border-rule wide:px-(--margin) ${here ? 'text-ink after:absolute after:bg-ink max-wide:after:inset-x-0 max-wide:after:bottom-0 max-wide:after:h-1 wide:bg-lit wide:after:inset-y-0 wide:after:left-0 wide:after:w-1' : 'text-ink2 hover:text-ink'}`}
                  style={{ fontWeight: here ? 600 : 500 }}
                >
                  {section.name}
                </Link>
              );
            })}
        </div>
      ))}
    </nav>
  );
}

/** What stands around every page of the settings. */
export function SettingsFrame({ children }: { children: ReactNode }) {
  const path = usePathname();
  const { may } = useMe();
  const sections = sectionsFor(may);
  const here = sections.find((section) => isHere(section, path));
  return (
    <>
      {here && (
        <Link href="/settings" className="flex min-h-11 items-center gap-2 border-b bg-desk px-(--margin) font-mono text-[0.8125rem] font-semibold no-underline strip:hidden">
          <BackIcon size={16} />
          Settings
        </Link>
      )}
      <PageHead title={here?.name ?? 'Settings'} meta={here ? <span className="max-strip:hidden">{here.says}</span> : undefined} />
      <div className="wide:grid wide:min-h-[calc(100dvh-101px)] wide:grid-cols-[284px_minmax(0,1fr)]">
        <Sections sections={sections} path={path} />
        <div className="min-w-0 pb-10">{children}</div>
      </div>
    </>
  );
}
