import type { Metadata } from 'next';
import { Leaf } from '@/components/sign-in/Leaf';
import { LinkSignIn } from '@/components/sign-in/LinkSignIn';

export const metadata: Metadata = { title: 'Sign in' };

export default function LinkSignInPage() {
  return (
    <Leaf>
      <LinkSignIn />
    </Leaf>
  );
}
