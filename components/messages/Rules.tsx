'use client';

import { Fragment, useState } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { saveMessages } from '@/lib/client/messages';
import type { MessagesBody } from '@/lib/contracts/messages';
import { RuleForm } from './RuleForm';
import { useSaving } from './use-saving';
import { byLevel, RULE_TITLES, stateOfRule } from './words';

type Means = MessagesBody['choices'][number]['means'];

const MEANS: { name: Means; word: string }[] = [
  { name: 'mail', word: 'mail' },
  { name: 'push', word: 'device' },
];

interface RulesProps {
  messages: MessagesBody;
  /** May set the cellar's rules. */
  maySet: boolean;
}

/** What is watched, how patiently, and by which means the reader hears of it. */
export function Rules({ messages, maySet }: RulesProps) {
  const { busy, failed, run } = useSaving('The choice was not kept. Try again.');
  const [open, setOpen] = useState<string | null>(null);
  // The box shows what was tapped until the answer is there.
  const [tapped, setTapped] = useState<Map<string, boolean>>(new Map());
  const wanted = (rule: string, means: Means) => tapped.get(`${rule} ${means}`) ?? messages.choices.find((choice) => choice.rule === rule && choice.means === means)?.wanted ?? false;

  const choose = async (rule: MessagesBody['rules'][number]['rule'], means: Means, value: boolean) => {
    setTapped((before) => new Map(before).set(`${rule} ${means}`, value));
    await run(() => saveMessages({ choices: [{ rule, means, wanted: value }] }));
    setTapped((before) => {
      const after = new Map(before);
      after.delete(`${rule} ${means}`);
      return after;
    });
  };

  return (
    <section aria-label="What you hear of">
      <GroupBar word="What you hear of" note={maySet ? 'boxes for you, spans for all' : 'the boxes are yours alone'} />
      {failed && <FormError>{failed}</FormError>}
      <div aria-hidden className="type-tick hidden items-end gap-x-4 border-b border-rule px-(--margin) py-1 text-ink2 strip:grid strip:grid-cols-[92px_minmax(0,1fr)_52px_52px_76px]">
        <span />
        <span />
        {MEANS.map(({ name, word }) => (
          <span key={name}>{word}</span>
        ))}
      </div>
      <ul>
        {byLevel(messages.rules).map((rule) => {
          const title = RULE_TITLES[rule.rule];
          return (
            <Fragment key={rule.rule}>
              <li className="grid items-start gap-x-4 gap-y-2 border-b border-rule px-(--margin) py-2.5 strip:grid-cols-[92px_minmax(0,1fr)_52px_52px_76px]">
                <State state={rule.enabled ? stateOfRule(rule) : 'Leave be'} word={rule.enabled ? undefined : 'Off'} />
                <div className="min-w-0">
                  <h3 className="type-verdict">{title}</h3>
                  {rule.enabled ? (
                    <p className="type-reason text-ink2">
                      <Sentence>{rule.begins}</Sentence> <Sentence>{rule.ends}</Sentence>
                    </p>
                  ) : (
                    <p className="type-reason text-ink2">Off in this cellar: no alert, no message.</p>
                  )}
                </div>
                <div className="flex gap-6 strip:contents">
                  {MEANS.map(({ name, word }) => (
                    <Box key={name} ticked={rule.enabled && wanted(rule.rule, name)} disabled={!rule.enabled} notYet={!rule.enabled} label={`${title}, by ${word}`} onTick={(value) => void choose(rule.rule, name, value)} className="strip:mt-0.5">
                      <span className="type-label leading-5 max-strip:-ml-1 strip:hidden">{word}</span>
                    </Box>
                  ))}
                  {maySet ? (
                    <Button size="lane" look="quiet" disabled={busy && open === rule.rule} aria-expanded={open === rule.rule} aria-label={`Set: ${title}`} onClick={() => setOpen(open === rule.rule ? null : rule.rule)} className="max-strip:ml-auto">
                      {open === rule.rule ? 'Close' : 'Set'}
                    </Button>
                  ) : (
                    <span />
                  )}
                </div>
              </li>
              {open === rule.rule && (
                <li className="border-b bg-desk px-(--margin) py-4">
                  <RuleForm rule={rule} batchId={null} onDone={() => setOpen(null)} />
                </li>
              )}
            </Fragment>
          );
        })}
      </ul>
    </section>
  );
}
