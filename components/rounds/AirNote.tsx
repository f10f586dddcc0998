'use client';

import { How } from '@/components/ui/How';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { useBatches } from '@/lib/client/batches';
import { airNote } from '@/lib/core/gas/air';

/** What whoever walks in should know of the air, where the vessels work hard. */
export function AirNote() {
  const { batches } = useBatches({ state: 'working' });
  const rates = (batches ?? []).flatMap((batch) => (batch.assessment?.gas_l_per_h ? [batch.assessment.gas_l_per_h.value] : []));
  const working = rates.filter((rate) => rate > 0.05);
  const note = airNote(working.reduce((sum, rate) => sum + rate, 0), working.length);
  if (!note) return null;
  return (
    <section aria-label="Air" className="border-b border-l-[6px] border-l-ochre bg-lit py-2 pl-3 pr-(--margin)">
      <State state="Check" word="Air the room" size={13} />
      <p className="type-reason max-w-[80ch]">
        <Sentence>{note.sentence}</Sentence>
      </p>
      <How how={note.rise.how} of="the air of the room" />
    </section>
  );
}
