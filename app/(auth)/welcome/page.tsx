import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { Welcome } from '@/components/people/Welcome';
import { Leaf } from '@/components/sign-in/Leaf';
import { currentSession } from '@/lib/auth/session';
import { nameOf } from '@/lib/services/people/name';

export const metadata: Metadata = { title: 'No cellar yet' };

export default async function WelcomePage() {
  const session = await currentSession();
  if (!session) redirect('/sign-in');
  if (session.actor) redirect('/shelf');
  return (
    <Leaf>
      <Welcome id={session.personId} name={await nameOf(session.personId)} />
    </Leaf>
  );
}
