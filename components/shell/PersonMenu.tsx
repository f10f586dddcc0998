'use client';

import Link from 'next/link';
import { signOut } from '@/lib/client/sign-in';
import { Menu, MENU_ITEM } from './Menu';
import type { CellarGlance } from './use-glance';

/** `Oriel Thatcher` → `Oriel T.` */
export function shortName(name: string): string {
  const [first, ...rest] = name.trim().split(/\s+/);
  const last = rest.at(-1);
  return last ? `${first} ${[...last][0]}.` : (first ?? '');
}

/** Behind the person's name: the settings, the way out. */
export function PersonMenu({ glance }: { glance: CellarGlance }) {
  if (!glance.person) return null;
  return (
    <Menu word={<b className="block max-w-[18ch] truncate font-semibold">{shortName(glance.person)}</b>} className="text-ink">
      {(close) => (
        <>
          <Link href="/settings" className={MENU_ITEM} onClick={close}>
            Settings
          </Link>
          <Link href="/settings/profile" className={MENU_ITEM} onClick={close}>
            Profile and units
          </Link>
          <button
            type="button"
            className={`${MENU_ITEM} border-t`}
            onClick={() => {
              close();
              void signOut();
            }}
          >
            Sign out
          </button>
        </>
      )}
    </Menu>
  );
}
