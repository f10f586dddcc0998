import { devicesOf } from '@/db/queries/devices';
import { choicesOf, escalationOf, messageTimesOf, ruleSettingsOf, tellable } from '@/db/queries/messages';
import { mutesOf } from '@/db/queries/mutes';
import type { Actor } from '@/lib/auth/policies';
import { messagesSchema, type MessagesBody } from '@/lib/contracts/messages';
import { ALERT_RULES, ruleAsSet, ruleWords, type AlertRule, type RuleSetting } from '@/lib/core/alerts/rules';
import { isWanted, MEANS } from '@/lib/core/alerts/telling';
import { pushKeys } from '@/lib/push/keys';
import { presentMute } from './mutes';

const MINUTE_MS = 60_000;

function presentRule(usual: AlertRule, settings: readonly RuleSetting[]) {
  const { rule, enabled } = ruleAsSet(usual, settings);
  return { rule: rule.name, level: rule.level, enabled, ...ruleWords(rule), for_min: rule.forMs / MINUTE_MS, keep_min: rule.keepMs / MINUTE_MS, changed: settings.some((item) => item.rule === rule.name) };
}

/** All that decides who is told of what, as the asker may see it. */
export async function presentMessages(actor: Actor, signInId: string | null, now: Date): Promise<MessagesBody> {
  const { cellarId, personId } = actor;
  const [people, settings, choices, times, devices, escalation, mutes] = await Promise.all([
    tellable(cellarId),
    ruleSettingsOf(cellarId, null),
    choicesOf(cellarId, personId),
    messageTimesOf(personId),
    devicesOf(personId),
    escalationOf(cellarId),
    mutesOf(cellarId, now),
  ]);
  const named = new Map(people.map(({ id, name }) => [id, { id, name }]));
  const cellarWide = settings.filter(({ batchId }) => batchId === null);
  return messagesSchema.parse({
    time_zone: people.find(({ id }) => id === personId)?.timeZone ?? 'UTC',
    quiet: times.quiet && { from: times.quiet.fromMin, to: times.quiet.toMin },
    digest_at: times.digestMin,
    choices: ALERT_RULES.flatMap((rule) => MEANS.map((means) => ({ rule: rule.name, means, wanted: isWanted(rule, means, choices) }))),
    devices: devices.map((device) => ({
      id: device.id,
      user_agent: device.userAgent,
      created_at: device.createdAt.toISOString(),
      last_taken_at: device.lastTakenAt?.toISOString() ?? null,
      last_error: device.lastError,
      this_sign_in: device.signInId === signInId,
    })),
    push_key: pushKeys().publicKey,
    rules: ALERT_RULES.map((rule) => presentRule(rule, cellarWide)),
    exceptions: settings.flatMap((setting) => {
      const usual = ALERT_RULES.find(({ name }) => name === setting.rule);
      if (setting.batchId === null || setting.batchName === null || !usual) return [];
      return [{ ...presentRule(usual, [setting]), batch: { id: setting.batchId, name: setting.batchName } }];
    }),
    escalation: { after_min: escalation?.afterMin ?? 30, people: (escalation?.order ?? []).flatMap((id) => named.get(id) ?? []) },
    people: [...named.values()],
    mutes: mutes.map(presentMute),
  });
}
