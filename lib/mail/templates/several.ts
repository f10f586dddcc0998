import { batchLink, evidenceAndAct, stateOf, takeLink } from '../parts';
import type { AlertPayload, MailPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { bare, lasting, vesselName, when } from '../words';
import { digestBlocks, digestSubject } from './digest';
import { ingestMail } from './ingest';
import { testMail } from './test';
import { timerBlocks, timerSubject } from './timer';

const ORDER = { act: 0, check: 1, know: 2 } as const;
const EVENT_ORDER = { opened: 0, repeated: 1, look_again: 2, resolved: 3 } as const;

function byUrgency(a: AlertPayload, b: AlertPayload): number {
  return EVENT_ORDER[a.event] - EVENT_ORDER[b.event] || ORDER[a.alert.level] - ORDER[b.alert.level] || Date.parse(a.at) - Date.parse(b.at);
}

/** @param warned rules whose caution stands above already */
function item(payload: AlertPayload, context: RenderContext, warned: Set<string>): Block[] {
  const { alert, batch, cellar, event, at } = payload;
  const line: Block = { type: 'line', text: `${vesselName(batch)}${batch.place === null ? '' : `, ${batch.place}`}, ${cellar.name}. Since ${when(alert.since, cellar.time_zone)}.` };
  if (event === 'resolved') return [{ type: 'rule' }, { type: 'prose', text: `${vesselName(batch)}: “${bare(alert.headline)}” has passed, after ${lasting(alert.since, at)}.` }];
  const known = warned.has(alert.rule);
  warned.add(alert.rule);
  const state = event === 'look_again' ? ({ type: 'state', word: 'In hand', colour: 'ink2' } as const) : stateOf(alert);
  return [
    { type: 'rule' },
    event === 'repeated' ? { ...state, word: `${state.word}, still` } : state,
    { type: 'title', text: alert.headline },
    line,
    ...evidenceAndAct(payload).filter((block) => block.type !== 'caution' || !known),
    batchLink(payload, context),
    ...(event === 'look_again' ? [] : [takeLink(payload, context)]),
  ];
}

/** Several that came together, most urgent first, in one mail. */
export function several(payloads: readonly MailPayload[], context: RenderContext): Rendered {
  const alerts = payloads.filter((payload) => payload.template === 'alert').toSorted(byUrgency);
  const house = payloads.filter((payload) => payload.template === 'ingest');
  const timers = payloads.filter((payload) => payload.template === 'timer');
  const digests = payloads.filter((payload) => payload.template === 'digest');
  const tests = payloads.filter((payload) => payload.template === 'test').slice(0, 1);
  const begun = alerts.filter((payload) => payload.event !== 'resolved');
  const urgent = begun.some((payload) => payload.alert.level === 'act');
  const lead = begun[0] ?? alerts[0];
  const told = alerts.length + house.length + timers.length;
  const [clock] = timers;
  const count = `${told} ${told === 1 ? 'message' : 'messages'}`;
  const first = digests[0];
  // A clock that has run down cannot wait; the rest can be read on.
  const subject = clock
    ? `${timerSubject(clock)}, and more`
    : lead
    ? `${urgent ? 'Now: ' : ''}${count}: ${vesselName(lead.batch)}: ${bare(lead.alert.headline)}${told > 1 || first ? ', and more' : ''}`
    : told
      ? `${count} about readings that do not come in`
      : first
        ? `${digestSubject(first)}${digests.length > 1 ? ', and more' : ''}`
        : testMail(tests[0]!, context).subject;
  const warned = new Set<string>();
  return render(subject, [
    ...(told ? [{ type: 'title', text: told > 1 ? `${count} at once` : count } as const] : []),
    ...timers.flatMap((payload): Block[] => [{ type: 'rule' }, ...timerBlocks(payload, context)]),
    ...house.map((payload): Block => ({ type: 'prose', text: `${ingestMail(payload, context).subject} (${when(payload.at, payload.time_zone)}).` })),
    ...alerts.flatMap((payload) => item(payload, context, warned)),
    ...digests.flatMap((payload, index): Block[] => [...(told > 0 || index > 0 ? [{ type: 'rule' } as const] : []), ...digestBlocks(payload, context)]),
    ...tests.map((): Block => ({ type: 'prose', text: 'You asked whether messages arrive: they do.' })),
    { type: 'rule' },
    { type: 'foot', text: 'They were owed together, so they come as one mail. Where local law or licensed practice says otherwise, follow it.' },
  ]);
}
