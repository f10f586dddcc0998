import type { Sequelize } from 'sequelize';
import { Alert } from './alert';
import { Assignment } from './assignment';
import { AuditRow } from './audit-row';
import { Batch } from './batch';
import { Cellar } from './cellar';
import { Entry } from './entry';
import { Membership } from './membership';
import { OutboxMail } from './outbox-mail';
import { Person } from './person';
import { Sensor } from './sensor';
import { SignIn } from './sign-in';

export { Alert, Assignment, AuditRow, Batch, Cellar, Entry, Membership, OutboxMail, Person, Sensor, SignIn };

const MODELS = [Alert, Assignment, AuditRow, Batch, Cellar, Entry, Membership, OutboxMail, Person, Sensor, SignIn];

/** Binds every model to a connection; the last one bound is the one they use. */
export function initModels(sequelize: Sequelize): void {
  for (const model of MODELS) model.register(sequelize);
}
