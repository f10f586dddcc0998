import type { ReactNode } from 'react';
import { Wordmark } from '@/components/ui/Mark';

/** One narrow sheet with one thing to do, for those who are not inside yet. */
export function Leaf({ children }: { children: ReactNode }) {
  return (
    <div className="flex min-h-dvh flex-col items-center bg-desk px-(--margin) py-10 strip:pt-[12vh]">
      <div className="w-full max-w-[480px]">
        <Wordmark size={28} />
        <main className="mt-5 border-[1.5px] border-ink bg-sheet px-5 py-6 strip:px-8 strip:py-7">{children}</main>
      </div>
    </div>
  );
}
