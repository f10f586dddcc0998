import type { Metadata } from 'next';
import { Leaf } from '@/components/sign-in/Leaf';
import { ConfirmMail } from '@/components/sign-in/ConfirmMail';

export const metadata: Metadata = { title: 'Mail address' };

export default function ConfirmMailPage() {
  return (
    <Leaf>
      <ConfirmMail />
    </Leaf>
  );
}
