'use client';

import { Button } from '@/components/ui/Button';
import { StateMark } from '@/components/ui/StateMark';
import { useMe } from '@/lib/client/me';
import { forgetLeft, useLeft } from './left-cellar';

/** Says that another cellar is shown than before, where it was not the person who chose it. */
export function LeftBar() {
  const { me } = useMe();
  const left = useLeft(me?.person.id);
  return (
    <div role="status">
      {me && left !== null && (
        <p className="type-body flex flex-wrap items-center gap-x-3 gap-y-2 border-b bg-desk px-(--margin) py-2 text-ink">
          <StateMark state="Check" />
          <span className="min-w-0 flex-1 basis-56 break-words">
            You are no longer in <b className="font-semibold">{left}</b>. This is <b className="font-semibold">{me.cellar.name}</b>.
          </span>
          <Button size="lane" onClick={forgetLeft}>
            I have read it
          </Button>
        </p>
      )}
    </div>
  );
}
