import { QueryTypes, type Transaction } from 'sequelize';
import type { RuleSetting } from '../../lib/core/alerts/rules';
import type { Escalation, MeansName, MessageChoice, QuietHours } from '../../lib/core/alerts/telling';
import { database } from '../client';
import { OPEN_SIGN_IN } from './sessions';

export interface Hearer {
  personId: string;
  choices: MessageChoice[];
  /** Some device of theirs takes push messages. */
  hasDevice: boolean;
}

/** Who of a cellar can be told of alerts: all but guests, oldest membership first. */
export function hearersOf(cellarId: string, transaction: Transaction): Promise<Hearer[]> {
  return database().query<Hearer>(
    `select m.person_id as "personId",
       coalesce((select json_agg(json_build_object('rule', c.rule, 'means', c.means, 'wanted', c.wanted)) from message_choices c where c.cellar_id = m.cellar_id and c.person_id = m.person_id), '[]') as choices,
       exists (select 1 from push_subscriptions d join sign_ins s on s.id = d.sign_in_id where d.person_id = m.person_id and ${OPEN_SIGN_IN}) as "hasDevice"
     from memberships m where m.cellar_id = $cellarId and m.role in ('keeper', 'brewer', 'hand') order by m.created_at, m.person_id`,
    { bind: { cellarId }, type: QueryTypes.SELECT, transaction },
  );
}

/** Who can be told in a cellar, by name. */
export function tellable(cellarId: string, transaction?: Transaction): Promise<Array<{ id: string; name: string; timeZone: string }>> {
  return database().query(
    `select p.id, p.name, p.time_zone as "timeZone" from memberships m join people p on p.id = m.person_id where m.cellar_id = $cellarId and m.role in ('keeper', 'brewer', 'hand') order by p.name, p.id`,
    { bind: { cellarId }, type: QueryTypes.SELECT, transaction },
  );
}

interface SettingRow extends Omit<RuleSetting, 'ofBatch'> {
  batchId: string | null;
  batchName: string | null;
}

/** The cellar's settings of rules with those of one batch, or with all batches' where none is named. */
export async function ruleSettingsOf(cellarId: string, batchId: string | null, transaction?: Transaction): Promise<Array<RuleSetting & Pick<SettingRow, 'batchId' | 'batchName'>>> {
  const rows = await database().query<SettingRow>(
    `select s.rule, s.batch_id as "batchId", b.name as "batchName", s.enabled, s.for_min as "forMin", s.keep_min as "keepMin"
     from rule_settings s left join batches b on b.id = s.batch_id
     where s.cellar_id = $cellarId and ($batchId::uuid is null or s.batch_id is null or s.batch_id = $batchId) order by s.rule, b.name nulls first, s.id`,
    { bind: { cellarId, batchId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => ({ ...row, ofBatch: row.batchId !== null }));
}

/** Keeps a setting, or forgets it where it is the usual. */
export async function saveRuleSetting(cellarId: string, batchId: string | null, setting: Omit<RuleSetting, 'ofBatch'> | { rule: string }, transaction: Transaction): Promise<void> {
  await database().query(`delete from rule_settings where cellar_id = $cellarId and rule = $rule and batch_id is not distinct from $batchId::uuid`, { bind: { cellarId, batchId, rule: setting.rule }, transaction });
  if (!('enabled' in setting)) return;
  await database().query(`insert into rule_settings (cellar_id, batch_id, rule, enabled, for_min, keep_min) values ($cellarId, $batchId, $rule, $enabled, $forMin, $keepMin)`, {
    bind: { cellarId, batchId, ...setting },
    transaction,
  });
}

export async function escalationOf(cellarId: string, transaction?: Transaction): Promise<Escalation | null> {
  const [row] = await database().query<{ afterMin: number; order: string[] }>(`select after_min as "afterMin", people as "order" from escalations where cellar_id = $cellarId`, {
    bind: { cellarId },
    type: QueryTypes.SELECT,
    transaction,
  });
  return row ?? null;
}

/** An empty order: everybody is told at once. */
export async function saveEscalation(cellarId: string, { afterMin, order }: Escalation, transaction: Transaction): Promise<void> {
  await database().query(`insert into escalations (cellar_id, after_min, people) values ($cellarId, $afterMin, $order::uuid[]) on conflict (cellar_id) do update set after_min = excluded.after_min, people = excluded.people`, {
    bind: { cellarId, afterMin, order },
    transaction,
  });
}

/** Keeps a person's choice for one rule and means; null: the usual again. */
export async function saveChoice(cellarId: string, personId: string, { rule, means, wanted }: { rule: string; means: MeansName; wanted: boolean | null }, transaction: Transaction): Promise<void> {
  if (wanted === null) {
    await database().query(`delete from message_choices where cellar_id = $cellarId and person_id = $personId and rule = $rule and means = $means`, { bind: { cellarId, personId, rule, means }, transaction });
    return;
  }
  await database().query(
    `insert into message_choices (cellar_id, person_id, rule, means, wanted) values ($cellarId, $personId, $rule, $means, $wanted)
     on conflict (cellar_id, person_id, rule, means) do update set wanted = excluded.wanted`,
    { bind: { cellarId, personId, rule, means, wanted }, transaction },
  );
}

export async function choicesOf(cellarId: string, personId: string): Promise<MessageChoice[]> {
  return database().query(`select rule, means, wanted from message_choices where cellar_id = $cellarId and person_id = $personId`, { bind: { cellarId, personId }, type: QueryTypes.SELECT });
}

export interface MessageTimes {
  quiet: QuietHours | null;
  /** Minutes after midnight; null: no digest. */
  digestMin: number | null;
}

export async function messageTimesOf(personId: string, transaction?: Transaction): Promise<MessageTimes> {
  const [row] = await database().query<{ from: number | null; to: number | null; digest: number | null }>(
    `select quiet_from as "from", quiet_to as "to", digest_at as "digest" from message_times where person_id = $personId`,
    { bind: { personId }, type: QueryTypes.SELECT, transaction },
  );
  return { quiet: row && row.from !== null && row.to !== null ? { fromMin: row.from, toMin: row.to } : null, digestMin: row?.digest ?? null };
}

export async function saveMessageTimes(personId: string, { quiet, digestMin }: MessageTimes, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into message_times (person_id, quiet_from, quiet_to, digest_at) values ($personId, $from, $to, $digest)
     on conflict (person_id) do update set quiet_from = excluded.quiet_from, quiet_to = excluded.quiet_to, digest_at = excluded.digest_at`,
    { bind: { personId, from: quiet?.fromMin ?? null, to: quiet?.toMin ?? null, digest: digestMin }, transaction },
  );
}

export interface DigestWish {
  personId: string;
  cellarId: string;
  timeZone: string;
  digestMin: number;
}

/** Everybody who wants a digest, with each cellar that they tend. */
export function digestWishes(): Promise<DigestWish[]> {
  return database().query(
    `select t.person_id as "personId", m.cellar_id as "cellarId", p.time_zone as "timeZone", t.digest_at as "digestMin"
     from message_times t join people p on p.id = t.person_id join memberships m on m.person_id = t.person_id
     where t.digest_at is not null and m.role <> 'guest' order by t.person_id, m.created_at, m.cellar_id`,
    { type: QueryTypes.SELECT },
  );
}
