import type { AlertBody } from '@/lib/contracts/alerts';
import type { CallBody } from '@/lib/contracts/assessment';
import type { LaneBody } from '@/lib/contracts/batches';
import { CALL_NAMES, type CallName } from '@/lib/core/types';

/** Thu 15 Oct 2026, 14:32 UTC, in seconds. */
export const NOW = Date.parse('2026-10-15T14:32:00Z') / 1000;
export const at = (time: string) => new Date(Date.parse(time)).toISOString();

let count = 0;
const id = () => `00000000-0000-4000-8000-${String(++count).padStart(12, '0')}`;

const quiet: CallBody = { verdict: 'no', kind: null, since: null, expected_at: null, headline: 'Nothing to do.', reason: 'It works.', act: null, changes_it: null, evidence: [] };

type Given = Partial<Omit<LaneBody, 'alerts' | 'entries'>> & {
  calls?: Partial<Record<CallName, Partial<CallBody>>>;
  alerts?: readonly Partial<LaneBody['alerts'][number]>[];
  entries?: readonly Partial<LaneBody['entries'][number]>[];
};

/** A stout in its sixth day; what is given replaces its parts. */
export function aLane({ calls = {}, alerts = [], entries = [], ...given }: Given): LaneBody {
  return {
    id: id(),
    name: 'Oat stout',
    kind: 'beer',
    drink_colour: 'stout',
    vessel_kind: 'carboy',
    tag: 5,
    place: null,
    volume_l: 10,
    vessel_l: 11.5,
    neck: 'airlock',
    pitched_at: at('2026-10-09T19:00Z'),
    original_gravity: 1.068,
    yeast: null,
    attenuation_min_percent: null,
    attenuation_max_percent: null,
    alcohol_tolerance_abv: null,
    temperature_min_c: null,
    temperature_max_c: null,
    state: 'working',
    ended_at: null,
    created_at: at('2026-10-09T19:00Z'),
    must: null,
    overruled: [],
    sensor: { id: 'float-05', name: 'Float 05', last_heard_at: at('2026-10-15T14:31Z') },
    assessment: {
      at: at('2026-10-15T14:31Z'),
      stage: 'slowing',
      gravity: { value: 1.041, lo: 1.04, hi: 1.042 },
      temperature_c: 18,
      last_reading_at: at('2026-10-15T14:31Z'),
      rate_points_per_day: null,
      gas_l_per_h: null,
      final_gravity: null,
      terminal_at: null,
      abv_percent: { value: 3.5 },
      expected_abv_percent: null,
      attenuation_percent: null,
      calls: Object.fromEntries(CALL_NAMES.map((name) => [name, { ...quiet, ...calls[name] }])) as Record<CallName, CallBody>,
    },
    alerts: alerts.map((alert) => ({ id: '00000000-0000-4000-8000-0000000000a1', call: 'stalled', state: 'open', opened_at: at('2026-10-15T12:00Z'), taken_by: null, ...alert })),
    series: { from: at('2026-10-01T00:00Z'), to: at('2026-10-20T00:00Z'), count: 0, at: [], gravity: [], temperature: [] },
    curve: [],
    expected: [],
    entries: entries.map((entry) => ({ id: id(), kind: 'note', at: at('2026-10-12T09:00Z'), gravity: null, neck: null, text: null, ...entry })),
    ...given,
  };
}

/** An open alert of that lane, of its stall unless told. */
export function anAlert(lane: LaneBody, given: Partial<AlertBody> = {}): AlertBody {
  return {
    id: '00000000-0000-4000-8000-0000000000a1',
    batch: { id: lane.id, name: lane.name, tag: lane.tag, vessel_kind: lane.vessel_kind, drink_colour: lane.drink_colour, neck: lane.neck, volume_l: lane.volume_l, vessel_l: lane.vessel_l },
    call: 'stalled',
    kind: null,
    level: 'check',
    state: 'open',
    since: at('2026-10-15T10:00Z'),
    opened_at: at('2026-10-15T12:00Z'),
    acknowledged_at: null,
    acknowledged_by: null,
    note: null,
    look_again_at: null,
    resolved_at: null,
    resolved_by: null,
    gone: null,
    evidence: quiet,
    told: [],
    muted_until: null,
    ...given,
  };
}
