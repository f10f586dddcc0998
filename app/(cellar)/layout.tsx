import { redirect } from 'next/navigation';
import type { ReactNode } from 'react';
import { CellarShell } from '@/components/shell/CellarShell';
import { currentSession } from '@/lib/auth/session';

/** Every page of a cellar is for somebody who is signed in. */
export default async function CellarLayout({ children }: { children: ReactNode }) {
  const session = await currentSession();
  if (!session) redirect('/sign-in');
  if (!session.actor) redirect('/welcome');
  return <CellarShell>{children}</CellarShell>;
}
