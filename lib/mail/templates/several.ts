import { batchLink, evidenceAndAct, stateOf } from '../parts';
import type { AlertPayload, MailPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { bare, lasting, vesselName, when } from '../words';
import { ingestMail } from './ingest';

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
  ];
}

/** Several that came together, most urgent first, in one mail. */
export function several(payloads: readonly MailPayload[], context: RenderContext): Rendered {
  const alerts = payloads.filter((payload) => payload.template === 'alert').toSorted(byUrgency);
  const house = payloads.filter((payload) => payload.template === 'ingest');
  const begun = alerts.filter((payload) => payload.event !== 'resolved');
  const urgent = begun.some((payload) => payload.alert.level === 'act');
  const lead = begun[0] ?? alerts[0];
  const count = `${alerts.length + house.length} messages`;
  const subject = lead ? `${urgent ? 'Now: ' : ''}${count}: ${vesselName(lead.batch)}: ${bare(lead.alert.headline)}, and more` : `${count} about readings that do not come in`;
  const warned = new Set<string>();
  return render(subject, [
    { type: 'title', text: `${count} at once` },
    ...house.map((payload): Block => ({ type: 'prose', text: `${ingestMail(payload, context).subject} (${when(payload.at, payload.time_zone)}).` })),
    ...alerts.flatMap((payload) => item(payload, context, warned)),
    { type: 'rule' },
    { type: 'foot', text: 'They were owed together, so they come as one mail. Where local law or licensed practice says otherwise, follow it.' },
  ]);
}
