import type { Metadata } from 'next';
import { Leaf } from '@/components/sign-in/Leaf';
import { AskForLink } from '@/components/sign-in/AskForLink';

export const metadata: Metadata = { title: 'A link by mail' };

export default function AskForLinkPage() {
  return (
    <Leaf>
      <AskForLink />
    </Leaf>
  );
}
