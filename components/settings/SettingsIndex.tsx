'use client';

import Link from 'next/link';
import { MorePlaces } from '@/components/shell/MorePlaces';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Haze } from '@/components/ui/Haze';
import { OnwardIcon } from '@/components/ui/icons';
import { GroupBar } from '@/components/ui/Page';
import { chooseTheme, useTheme, type ThemeChoice } from '@/components/ui/theme';
import { useMe } from '@/lib/client/me';
import { signOut } from '@/lib/client/sign-in';
import { Row } from './Row';
import { ROLE_WORDS } from './roles';
import { sectionsFor, type Section } from './sections';

const THEMES: readonly { value: ThemeChoice; name: string }[] = [
  { value: 'day', name: 'Day' },
  { value: 'night', name: 'Night' },
  { value: 'clock', name: 'By the clock' },
];

function SectionRows({ of, sections }: { of: Section['of']; sections: readonly Section[] }) {
  return (
    <section aria-label={of}>
      <GroupBar word={of} />
      <ul>
        {sections
          .filter((section) => section.of === of)
          .map((section) => (
            <li key={section.href} className="border-b border-rule">
              <Link href={section.href} className="grid min-h-12 grid-cols-[minmax(0,1fr)_auto] items-center gap-x-5 px-(--margin) py-1.5 no-underline hover:bg-desk strip:min-h-10 strip:grid-cols-[9rem_minmax(0,1fr)_auto]">
                <span className="type-name-low">{section.name}</span>
                <span className="type-reason text-ink2 max-strip:col-start-1">{section.says}</span>
                <OnwardIcon size={14} className="text-ink2 max-strip:col-start-2 max-strip:row-span-2 max-strip:row-start-1" />
              </Link>
            </li>
          ))}
      </ul>
    </section>
  );
}

/** The person, this device, and where the rest is. */
export function SettingsIndex() {
  const { me, may, loading } = useMe();
  const { choice } = useTheme();
  const sections = sectionsFor(may);
  return (
    <>
      <MorePlaces />
      {loading && <Haze height={96} label="Loading the settings" className="mx-(--margin) my-3" />}
      {me && (
        <section aria-label="Signed in">
          <GroupBar word="Signed in" note={me.person.name} />
          <Row name="e-mail">
            <span className="font-mono text-[0.8125rem]">{me.person.email}</span>
          </Row>
          <Row name="here">
            {me.cellar.name}, {ROLE_WORDS[me.cellar.role]}
          </Row>
        </section>
      )}
      <section aria-label="This device">
        <GroupBar word="This device" />
        <div className="border-b border-rule px-(--margin) py-3">
          <Choice label="light" value={choice} onChoose={chooseTheme} options={THEMES} className="max-w-[380px]" />
          <p className="type-reason pt-1.5 text-ink2">
            By the clock, night is from <span className="fig">20:00</span> to <span className="fig">07:00</span>. Kept on this device alone.
          </p>
          <Button className="mt-3" onClick={() => void signOut()}>
            Sign out here
          </Button>
        </div>
      </section>
      {me && (
        <>
          <SectionRows of="You" sections={sections} />
          <SectionRows of="The cellar" sections={sections} />
        </>
      )}
    </>
  );
}
