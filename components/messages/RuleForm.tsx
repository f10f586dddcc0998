'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { saveRule } from '@/lib/client/messages';
import type { MessagesBody } from '@/lib/contracts/messages';
import { useSaving } from './use-saving';
import { spanOf, spansFor } from './words';

type Rule = MessagesBody['rules'][number];

interface RuleFormProps {
  rule: Rule;
  /** The one vessel it is set for; null: the cellar. */
  batchId: string | null;
  onDone: () => void;
}

/** On or off, and how patiently; for the cellar or for one vessel. */
export function RuleForm({ rule, batchId, onDone }: RuleFormProps) {
  const [on, setOn] = useState<'on' | 'off'>(rule.enabled ? 'on' : 'off');
  const [forMin, setFor] = useState(rule.for_min);
  const [keepMin, setKeep] = useState(rule.keep_min);
  const { busy, failed, run } = useSaving();
  const act = rule.level === 'act';
  const save = async (usual: boolean) => {
    const done = await run(() => saveRule(usual ? { rule: rule.rule, batch_id: batchId, usual } : { rule: rule.rule, batch_id: batchId, enabled: on === 'on', for_min: forMin === rule.for_min && !rule.changed ? null : forMin, keep_min: keepMin === rule.keep_min && !rule.changed ? null : keepMin }));
    if (done) onDone();
  };
  return (
    <div className="flex max-w-[560px] flex-col gap-3">
      <Choice label={batchId === null ? 'In this cellar' : 'For this vessel'} value={on} onChoose={setOn} options={[{ value: 'on', name: 'Watched' }, { value: 'off', name: 'Off' }]} className="max-w-[260px]" />
      {on === 'off' && act && (
        <p className="type-reason border-l-[3px] border-madder pl-3">This one is about glass and pressure. Off, nobody is told, and the shelf alone shows it.</p>
      )}
      {on === 'on' && (
        <div className="grid gap-3 strip:grid-cols-2">
          <Select label="Told after it was so for" value={forMin} onChange={(event) => setFor(Number(event.target.value))} hint={act ? 'Never later than usual: somebody could be hurt.' : undefined}>
            {spansFor(rule.for_min)
              .filter((span) => !act || span <= rule.for_min)
              .map((span) => (
                <option key={span} value={span}>
                  {spanOf(span)}
                </option>
              ))}
          </Select>
          <Select label="Over after it was gone for" value={keepMin} onChange={(event) => setKeep(Number(event.target.value))} hint="A shorter break is the same alert.">
            {spansFor(rule.keep_min).map((span) => (
              <option key={span} value={span}>
                {spanOf(span)}
              </option>
            ))}
          </Select>
        </div>
      )}
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap gap-2">
        <Button look="first" disabled={busy} onClick={() => void save(false)}>
          Set it so
        </Button>
        {rule.changed && (
          <Button disabled={busy} onClick={() => void save(true)}>
            As usual
          </Button>
        )}
        <Button look="quiet" onClick={onDone}>
          Leave it
        </Button>
      </div>
    </div>
  );
}
