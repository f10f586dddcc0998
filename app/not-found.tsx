import type { Metadata } from 'next';
import { LinkButton } from '@/components/ui/Button';
import { Wordmark } from '@/components/ui/Mark';

export const metadata: Metadata = { title: 'No such page' };

export default function NotFound() {
  return (
    <main className="flex min-h-dvh flex-col items-start gap-3 px-(--margin) py-11 wide:px-10">
      <Wordmark size={32} />
      <h1 className="type-title mt-8">There is no such page here</h1>
      <p className="type-body max-w-[60ch] text-ink2">The address may be mistyped, or what stood here belongs to another cellar. Nothing was changed.</p>
      <LinkButton href="/shelf" look="first">
        To the shelf
      </LinkButton>
    </main>
  );
}
