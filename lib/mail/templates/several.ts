import type { Texts } from '../../texts/texts';
import { batchLink, evidenceAndAct, headlineOf, stateBlock, stateOf, takeLink } from '../parts';
import type { AlertPayload, MailPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { lasting, listed, said, vesselName, when } from '../words';
import { digestBlocks, digestSubject } from './digest';
import { ingestMail } from './ingest';
import { timerBlocks, timerSubject } from './timer';

const ORDER = { act: 0, check: 1, know: 2 } as const;
const EVENT_ORDER = { opened: 0, repeated: 1, look_again: 2, resolved: 3 } as const;

function byUrgency(a: AlertPayload, b: AlertPayload): number {
  return EVENT_ORDER[a.event] - EVENT_ORDER[b.event] || ORDER[a.alert.level] - ORDER[b.alert.level] || Date.parse(a.at) - Date.parse(b.at);
}

/** What came together, by kind. */
function sorted(payloads: readonly MailPayload[]) {
  return {
    alerts: payloads.filter((payload) => payload.template === 'alert').toSorted(byUrgency),
    house: payloads.filter((payload) => payload.template === 'ingest'),
    timers: payloads.filter((payload) => payload.template === 'timer'),
    digests: payloads.filter((payload) => payload.template === 'digest'),
    tests: payloads.filter((payload) => payload.template === 'test').slice(0, 1),
  };
}
type Sorted = ReturnType<typeof sorted>;

/** @param warned rules whose caution stands above already */
function item(payload: AlertPayload, context: RenderContext, warned: Set<string>): Block[] {
  const { alert, batch, cellar, event, at } = payload;
  const { texts } = context;
  const { t } = texts;
  const vessel = vesselName(texts, batch);
  if (event === 'resolved') return [{ type: 'rule' }, { type: 'prose', text: t('several.passed', { vessel, headline: headlineOf(texts, payload), span: lasting(texts, alert.since, at) }) }];
  const known = warned.has(alert.rule);
  warned.add(alert.rule);
  const state = event === 'look_again' ? stateBlock(texts, 'In hand') : stateOf(texts, alert);
  return [
    { type: 'rule' },
    event === 'repeated' ? { ...state, word: t('state.still', { state: state.word }) } : state,
    { type: 'title', text: said(texts, alert.headline) },
    { type: 'line', text: t('several.since', { where: listed(texts, [vessel, batch.place]), cellar: cellar.name, since: when(texts, alert.since, cellar.time_zone) }) },
    ...evidenceAndAct(payload, context).filter((block) => block.type !== 'caution' || !known),
    batchLink(payload, context),
    ...(event === 'look_again' ? [] : [takeLink(payload, context)]),
  ];
}

/** A clock that has run down cannot wait and leads; the rest can be read on. */
function subjectOf(texts: Texts, { alerts, house, timers, digests }: Sorted): string {
  const { t } = texts;
  const begun = alerts.filter((payload) => payload.event !== 'resolved');
  const lead = begun[0] ?? alerts[0];
  const count = alerts.length + house.length + timers.length;
  const more = (subject: string, so: boolean) => (so ? t('several.subject.more', { subject }) : subject);
  if (timers[0]) return more(timerSubject(texts, timers[0]), true);
  if (lead) {
    const urgent = begun.some((payload) => payload.alert.level === 'act');
    return more(t(urgent ? 'several.subject.now' : 'several.subject', { count, vessel: vesselName(texts, lead.batch), headline: headlineOf(texts, lead) }), count > 1 || digests.length > 0);
  }
  if (count) return t('several.subject.readings', { count });
  return digests[0] ? more(digestSubject(texts, digests[0]), digests.length > 1) : t('test.subject');
}

/** Several that came together, most urgent first, in one mail. */
export function several(payloads: readonly MailPayload[], context: RenderContext): Rendered {
  const { texts } = context;
  const { t } = texts;
  const all = sorted(payloads);
  const told = all.alerts.length + all.house.length + all.timers.length;
  const warned = new Set<string>();
  return render(
    subjectOf(texts, all),
    [
      ...(told ? [{ type: 'title', text: t('several.title', { count: told }) } as const] : []),
      ...all.timers.flatMap((payload): Block[] => [{ type: 'rule' }, ...timerBlocks(payload, context)]),
      ...all.house.map((payload): Block => ({ type: 'prose', text: t('several.house', { subject: ingestMail(payload, context).subject, when: when(texts, payload.at, payload.time_zone) }) })),
      ...all.alerts.flatMap((payload) => item(payload, context, warned)),
      ...all.digests.flatMap((payload, index): Block[] => [...(told > 0 || index > 0 ? [{ type: 'rule' } as const] : []), ...digestBlocks(payload, context)]),
      ...all.tests.map((): Block => ({ type: 'prose', text: t('several.test') })),
      { type: 'rule' },
      { type: 'foot', text: t('several.foot') },
    ],
    texts,
  );
}
