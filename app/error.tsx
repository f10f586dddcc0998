'use client';

import { Button } from '@/components/ui/Button';
import { Wordmark } from '@/components/ui/Mark';

/** Where the frame of a page fell over, as without the database. Asking the server anew draws it; drawing the same answer again would not. */
export default function PageError() {
  return (
    <main role="alert" className="flex min-h-dvh flex-col items-start gap-3 px-(--margin) py-11 wide:px-10">
      <Wordmark size={32} />
      <h1 className="type-title mt-8">This page could not be drawn</h1>
      <p className="type-body max-w-[60ch] text-ink2">The server does not answer as it should right now. What was logged is safe; try again in a minute.</p>
      <Button look="first" onClick={() => location.reload()}>
        Try again
      </Button>
    </main>
  );
}
