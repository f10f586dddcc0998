import type { AssessmentBody, CallBody } from '@/lib/contracts/assessment';
import type { BatchBody, EntryBody } from '@/lib/contracts/batches';
import { CALL_NAMES, type CallName } from '@/lib/core/types';

export const NOW = Date.parse('2026-10-15T14:32:00Z') / 1000;
export const hours = (count: number): string => new Date((NOW + count * 3600) * 1000).toISOString();

export const call = (over: Partial<CallBody> = {}): CallBody => ({ verdict: 'no', kind: null, since: null, expected_at: null, headline: 'Nothing.', reason: 'None.', act: null, changes_it: null, evidence: [], ...over });

export const judged = (calls: Partial<Record<CallName, Partial<CallBody>>> = {}, over: Partial<AssessmentBody> = {}): AssessmentBody => ({
  at: hours(0),
  stage: 'slowing',
  gravity: { value: 1.041, lo: 1.0402, hi: 1.0418 },
  temperature_c: 18,
  last_reading_at: hours(-0.1),
  rate_points_per_day: null,
  gas_l_per_h: null,
  final_gravity: { value: 1.018, lo: 1.015, hi: 1.021, lo95: 1.013, hi95: 1.023 },
  terminal_at: { value: hours(120), lo: hours(110), hi: hours(160) },
  abv_percent: { value: 3.54 },
  expected_abv_percent: { value: 6.6 },
  attenuation_percent: 39.7,
  calls: Object.fromEntries(CALL_NAMES.map((name) => [name, call(calls[name])])) as AssessmentBody['calls'],
  ...over,
});

export const batch = (over: Partial<BatchBody> = {}): BatchBody => ({
  id: '00000000-0000-4000-8000-000000000001',
  name: 'Oat stout',
  kind: 'beer',
  drink_colour: 'stout',
  vessel_kind: 'carboy',
  tag: 5,
  place: 'back row',
  volume_l: 10,
  vessel_l: 10,
  neck: 'airlock',
  pitched_at: hours(-139),
  original_gravity: 1.068,
  yeast: null,
  attenuation_min_percent: 72,
  attenuation_max_percent: 80,
  alcohol_tolerance_abv: null,
  temperature_min_c: 18,
  temperature_max_c: 21,
  state: 'working',
  ended_at: null,
  created_at: hours(-140),
  must: null,
  sensor: { id: 'float-05', name: 'Float 05', last_heard_at: hours(-0.1) },
  assessment: judged(),
  overruled: [],
  alerts: [],
  ...over,
});

export const entry = (over: Partial<EntryBody> = {}): EntryBody => ({
  id: '00000000-0000-4000-8000-0000000000aa',
  batch_id: '00000000-0000-4000-8000-000000000001',
  kind: 'note',
  at: hours(-5),
  text: null,
  gravity: null,
  gravity_read: null,
  temperature_c: null,
  calibrated_at_c: null,
  neck: null,
  volume_l: null,
  sugar_g: null,
  fruit_g: null,
  detail: null,
  revised: false,
  person: { id: '00000000-0000-4000-8000-0000000000bb', name: 'Bram' },
  created_at: hours(-5),
  mine: false,
  ...over,
});
