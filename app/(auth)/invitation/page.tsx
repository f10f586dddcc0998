import type { Metadata } from 'next';
import { InvitationPage } from '@/components/people/InvitationPage';
import { Leaf } from '@/components/sign-in/Leaf';
import { currentSession } from '@/lib/auth/session';
import { nameOf } from '@/lib/services/people/name';

export const metadata: Metadata = { title: 'Invitation' };

export default async function Invitation() {
  const session = await currentSession();
  return (
    <Leaf>
      <InvitationPage signedInAs={session && (await nameOf(session.personId))} />
    </Leaf>
  );
}
