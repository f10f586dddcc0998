'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { useBatches } from '@/lib/client/batches';
import { saveRule } from '@/lib/client/messages';
import type { MessagesBody } from '@/lib/contracts/messages';
import { RuleForm } from './RuleForm';
import { useSaving } from './use-saving';
import { byLevel, RULE_TITLES } from './words';

/** Rules that hold otherwise for one vessel. */
export function Exceptions({ messages, maySet }: { messages: MessagesBody; maySet: boolean }) {
  const { batches } = useBatches({ state: 'working' });
  const [batchId, setBatchId] = useState('');
  const [ruleName, setRuleName] = useState('');
  const { busy, failed, run } = useSaving();
  const { exceptions } = messages;
  if (exceptions.length === 0 && !maySet) return null;
  const rule = messages.rules.find((item) => item.rule === ruleName);
  const known = exceptions.find((item) => item.rule === ruleName && item.batch.id === batchId);
  return (
    <section aria-label="Otherwise for one vessel">
      <GroupBar word="Otherwise for one vessel" note={exceptions.length === 0 ? 'the rules above hold for all' : `${exceptions.length} set`} />
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {exceptions.map((item) => (
          <li key={`${item.batch.id} ${item.rule}`} className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,13rem)_minmax(0,1fr)_auto]">
            <span className="type-name-low break-words">{item.batch.name}</span>
            <span className="type-body min-w-0">
              {RULE_TITLES[item.rule]}: {item.enabled ? <Sentence>{`${item.begins} ${item.ends}`}</Sentence> : 'off.'}
            </span>
            {maySet && (
              <Button size="lane" disabled={busy} aria-label={`As usual: ${RULE_TITLES[item.rule]}, ${item.batch.name}`} onClick={() => void run(() => saveRule({ rule: item.rule, batch_id: item.batch.id, usual: true }))}>
                As usual
              </Button>
            )}
          </li>
        ))}
      </ul>
      {maySet && (
        <div className="flex flex-col gap-4 px-(--margin) py-3">
          <div className="flex flex-wrap gap-3">
            <Select label="Vessel" value={batchId} onChange={(event) => setBatchId(event.target.value)} className="w-64 max-w-full">
              <option value="">Choose a vessel</option>
              {(batches ?? []).map((batch) => (
                <option key={batch.id} value={batch.id}>
                  {batch.tag === null ? batch.name : `${batch.name}, tag ${batch.tag}`}
                </option>
              ))}
            </Select>
            <Select label="Rule" value={ruleName} onChange={(event) => setRuleName(event.target.value)} className="w-72 max-w-full">
              <option value="">Choose a rule</option>
              {byLevel(messages.rules).map((item) => (
                <option key={item.rule} value={item.rule}>
                  {RULE_TITLES[item.rule]}
                </option>
              ))}
            </Select>
          </div>
          {batchId && rule && (
            <RuleForm
              key={`${batchId} ${ruleName}`}
              rule={known ?? { ...rule, changed: false }}
              batchId={batchId}
              onDone={() => {
                setBatchId('');
                setRuleName('');
              }}
            />
          )}
        </div>
      )}
    </section>
  );
}
