import { redirect } from 'next/navigation';
import type { ReactNode } from 'react';
import { CellarShell } from '@/components/shell/CellarShell';
import { currentSession } from '@/lib/auth/session';
import { getMe } from '@/lib/services/people/get-me';

/** Every page of a cellar is for somebody who is signed in. */
export default async function CellarLayout({ children }: { children: ReactNode }) {
  const session = await currentSession();
  if (!session) redirect('/sign-in');
  if (!session.actor) redirect('/welcome');
  const { person } = await getMe(session.actor);
  return <CellarShell units={person.units}>{children}</CellarShell>;
}
