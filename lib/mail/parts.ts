import { RULE_NAMES, type RuleName } from '../core/alerts/rules';
import type { StateWord } from '../core/calls/attention';
import type { TextKey } from '../texts/catalogue';
import type { Texts } from '../texts/texts';
import type { AlertPayload, RenderContext } from './payload';
import type { Block } from './render';
import { bare, figure, lasting, listed, said, vesselName, when } from './words';

type State = Extract<Block, { type: 'state' }>;

/** The shelf's words for a vessel with which there is something to do. */
export type Wanting = Exclude<StateWord, 'Leave be' | 'Done'>;

const STATES: Readonly<Record<Wanting, { key: Exclude<Extract<TextKey, `state.${string}`>, 'state.still'>; colour: State['colour'] }>> = {
  Stop: { key: 'state.stop', colour: 'madder' },
  Now: { key: 'state.now', colour: 'madder' },
  Check: { key: 'state.check', colour: 'ochre' },
  Silent: { key: 'state.silent', colour: 'ink2' },
  'In hand': { key: 'state.in-hand', colour: 'ink2' },
  Due: { key: 'state.due', colour: 'ink2' },
  Ready: { key: 'state.ready', colour: 'green' },
};

export function stateBlock({ t }: Texts, word: Wanting): State {
  const { key, colour } = STATES[word];
  return { type: 'state', word: t(key), colour };
}

/** The state's word and colour, as the shelf has them. */
export function stateOf(texts: Texts, { level, kind }: AlertPayload['alert']): State {
  return stateBlock(texts, kind === 'silent' ? 'Silent' : level === 'act' ? 'Now' : level === 'check' ? 'Check' : 'Ready');
}

/** What can hurt while doing what an alert asks; null: nothing that has to be said. */
const CAUTIONS: Readonly<Record<RuleName, Extract<TextKey, `advice.${string}.caution`> | null>> = {
  overdue: null,
  foam: 'advice.foam.caution',
  neck: 'advice.neck.caution',
  stalled: 'advice.stalled.caution',
  temperature: 'advice.temperature.caution',
  sensor: null,
  rack: 'advice.rack.caution',
  bottle: 'advice.bottle.caution',
  refermentation: 'advice.refermentation.caution',
};

/** What the watch says, without its full stop, to stand in a subject or a list. */
export const headlineOf = (texts: Texts, { alert }: AlertPayload): string => bare(said(texts, alert.headline));

/** Name, tag, place and since when, as one typed line. */
export function vesselLine({ batch, cellar, alert, at }: AlertPayload, { texts }: RenderContext): Block {
  return { type: 'line', text: texts.t('alert.since', { where: listed(texts, [vesselName(texts, batch), batch.place]), since: when(texts, alert.since, cellar.time_zone), span: lasting(texts, alert.since, at) }) };
}

/** The figures behind it, then what to do first and what can hurt. */
export function evidenceAndAct({ alert }: AlertPayload, { texts }: RenderContext): Block[] {
  const { t } = texts;
  const rule = RULE_NAMES.find((name) => name === alert.rule);
  const first = alert.act === null ? rule && t(`advice.${rule}.first`) : said(texts, alert.act);
  const caution = rule ? CAUTIONS[rule] : null;
  return [
    ...(alert.reason ? [{ type: 'prose', text: said(texts, alert.reason) } as const] : []),
    ...(alert.evidence.length
      ? [{ type: 'figures', rows: alert.evidence.map((item) => ({ name: item.name, value: figure(texts, item.value, item.unit), limit: item.threshold === null ? null : figure(texts, item.threshold, item.unit) })) } as const]
      : []),
    ...(first ? [{ type: 'part', label: t('alert.do-first'), text: first } as const] : []),
    ...(caution ? [{ type: 'caution', text: t(caution) } as const] : []),
  ];
}

export const batchLink = ({ batch }: AlertPayload, { publicUrl, texts }: RenderContext): Block => ({ type: 'link', label: texts.t('alert.open-batch'), url: `${publicUrl}/batches/${encodeURIComponent(batch.id)}` });

/** Where to say that one has it; then nobody is told again. The reader's own link needs no signing in. */
export function takeLink({ alert }: AlertPayload, { publicUrl, takeUrls, texts: { t } }: RenderContext): Block {
  const own = takeUrls?.get(alert.id);
  return { type: 'way', label: t('alert.take'), url: own ?? `${publicUrl}/alerts?alert=${encodeURIComponent(alert.id)}`, after: t(own ? 'alert.take.own' : 'alert.take.signed-in') };
}

/** As a zone is written for people. */
export const zoneName = (timeZone: string): string => timeZone.replaceAll('_', ' ');

export const cellarFoot = ({ cellar }: AlertPayload, { texts }: RenderContext): Block => ({ type: 'foot', text: texts.t('alert.foot', { cellar: cellar.name, zone: zoneName(cellar.time_zone) }) });
