import { ADVICE } from '../core/alerts/advice';
import { RULE_NAMES, type RuleName } from '../core/alerts/rules';
import type { AlertPayload, RenderContext } from './payload';
import type { Block } from './render';
import { figure, lasting, when } from './words';

/** The state's word and colour, as the shelf has them. */
export function stateOf({ level, kind }: AlertPayload['alert']): Extract<Block, { type: 'state' }> {
  if (kind === 'silent') return { type: 'state', word: 'Silent', colour: 'ink2' };
  if (level === 'act') return { type: 'state', word: 'Now', colour: 'madder' };
  return level === 'check' ? { type: 'state', word: 'Check', colour: 'ochre' } : { type: 'state', word: 'Ready', colour: 'green' };
}

const adviceOf = (rule: string) => (RULE_NAMES.includes(rule as RuleName) ? ADVICE[rule as RuleName] : null);

/** Name, tag, place and since when, as one typed line. */
export function vesselLine(payload: AlertPayload): Block {
  const { batch, cellar, alert, at } = payload;
  const where = [batch.name, batch.tag === null ? null : `tag ${batch.tag}`, batch.place].filter((item) => item !== null).join(', ');
  return { type: 'line', text: `${where}. Since ${when(alert.since, cellar.time_zone)}, ${lasting(alert.since, at)}.` };
}

/** The figures behind it, then what to do first and what can hurt. */
export function evidenceAndAct({ alert }: AlertPayload): Block[] {
  const advice = adviceOf(alert.rule);
  const first = alert.act ?? advice?.first;
  return [
    ...(alert.reason ? [{ type: 'prose', text: alert.reason } as const] : []),
    ...(alert.evidence.length
      ? [{ type: 'figures', rows: alert.evidence.map((item) => ({ name: item.name, value: figure(item.value, item.unit), limit: item.threshold === null ? null : figure(item.threshold, item.unit) })) } as const]
      : []),
    ...(first ? [{ type: 'part', label: 'do first', text: first } as const] : []),
    ...(advice?.caution ? [{ type: 'caution', text: advice.caution } as const] : []),
  ];
}

export const batchLink = ({ batch }: AlertPayload, { publicUrl }: RenderContext): Block => ({ type: 'link', label: 'Open the batch', url: `${publicUrl}/batches/${encodeURIComponent(batch.id)}` });

/** Where to say that one has it; then nobody is told again. The reader's own link needs no signing in. */
export function takeLink({ alert }: AlertPayload, { publicUrl, takeUrls }: RenderContext): Block {
  const own = takeUrls?.get(alert.id);
  return { type: 'way', label: 'I have it', url: own ?? `${publicUrl}/alerts?alert=${encodeURIComponent(alert.id)}`, after: own ? 'opens a page with one button; then nobody is told again.' : 'then nobody is told again.' };
}

export const cellarFoot = ({ cellar }: AlertPayload): Block => ({ type: 'foot', text: `${cellar.name}. Times are those of ${cellar.time_zone.replaceAll('_', ' ')}. Where local law or licensed practice says otherwise, follow it.` });
