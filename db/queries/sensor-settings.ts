import { QueryTypes } from 'sequelize';
import { database } from '../client';

export interface SettingsRow {
  identifier: string;
  version: number;
  intervalS: number;
  /** Removed: nothing is kept for it any more. */
  gone: boolean;
}

/** Settings that were sent down, of one cellar or of all. */
export function settingsToSend(cellarId: string | null): Promise<SettingsRow[]> {
  return database().query<SettingsRow>(
    `select identifier, settings_version as version, wanted_interval_s as "intervalS", removed_at is not null as gone
     from sensors where settings_version > 0 and wanted_interval_s is not null and ($cellarId::uuid is null or cellar_id = $cellarId::uuid)`,
    { bind: { cellarId }, type: QueryTypes.SELECT },
  );
}
