import type { Metadata } from 'next';
import { Leaf } from '@/components/sign-in/Leaf';
import { NewPassphrase } from '@/components/sign-in/NewPassphrase';

export const metadata: Metadata = { title: 'New passphrase' };

export default function NewPassphrasePage() {
  return (
    <Leaf>
      <NewPassphrase />
    </Leaf>
  );
}
