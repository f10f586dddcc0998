import type { Sequelize } from 'sequelize';
import { AccountLink } from './account-link';
import { Alert } from './alert';
import { ApiToken } from './api-token';
import { Assignment } from './assignment';
import { AuditRow } from './audit-row';
import { Batch } from './batch';
import { BatchLink } from './batch-link';
import { CalendarFeed } from './calendar-feed';
import { CalibrationRow } from './calibration';
import { CalibrationPointRow } from './calibration-point';
import { CatalogueItem } from './catalogue-item';
import { Cellar } from './cellar';
import { Entry } from './entry';
import { EntryRevision } from './entry-revision';
import { FiningRun } from './fining-run';
import { ImportRun } from './import-run';
import { Invitation } from './invitation';
import { Job } from './job';
import { Lot } from './lot';
import { LotBottle } from './lot-bottle';
import { Membership } from './membership';
import { Must } from './must';
import { MustVersion } from './must-version';
import { Opening } from './opening';
import { OutboxMail } from './outbox-mail';
import { Person } from './person';
import { Photo } from './photo';
import { Place } from './place';
import { ProbeAssignment } from './probe-assignment';
import { RecoveryCode } from './recovery-code';
import { Sensor } from './sensor';
import { SensorLimit } from './sensor-limit';
import { Share } from './share';
import { SignIn } from './sign-in';
import { Tasting } from './tasting';
import { Webhook } from './webhook';
import { WebhookDelivery } from './webhook-delivery';

export { AccountLink, Alert, ApiToken, Assignment, AuditRow, Batch, BatchLink, CalendarFeed, CalibrationPointRow, CalibrationRow, CatalogueItem, Cellar, Entry, EntryRevision, FiningRun, ImportRun, Invitation, Job, Lot, LotBottle, Membership, Must, MustVersion, Opening, OutboxMail, Person, Photo, Place, ProbeAssignment, RecoveryCode, Sensor, SensorLimit, Share, SignIn, Tasting, Webhook, WebhookDelivery };

const MODELS = [AccountLink, Alert, ApiToken, Assignment, AuditRow, Batch, BatchLink, CalendarFeed, CalibrationPointRow, CalibrationRow, CatalogueItem, Cellar, Entry, EntryRevision, FiningRun, ImportRun, Invitation, Job, Lot, LotBottle, Membership, Must, MustVersion, Opening, OutboxMail, Person, Photo, Place, ProbeAssignment, RecoveryCode, Sensor, SensorLimit, Share, SignIn, Tasting, Webhook, WebhookDelivery];

/** Binds every model to a connection; the last one bound is the one they use. */
export function initModels(sequelize: Sequelize): void {
  for (const model of MODELS) model.register(sequelize);
}
