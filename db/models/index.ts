import type { Sequelize } from 'sequelize';
import { Alert } from './alert';
import { Assignment } from './assignment';
import { AuditRow } from './audit-row';
import { Batch } from './batch';
import { BatchLink } from './batch-link';
import { CalendarFeed } from './calendar-feed';
import { CatalogueItem } from './catalogue-item';
import { Cellar } from './cellar';
import { Entry } from './entry';
import { EntryRevision } from './entry-revision';
import { FiningRun } from './fining-run';
import { Job } from './job';
import { Lot } from './lot';
import { LotBottle } from './lot-bottle';
import { Membership } from './membership';
import { Must } from './must';
import { MustVersion } from './must-version';
import { Opening } from './opening';
import { OutboxMail } from './outbox-mail';
import { Person } from './person';
import { Place } from './place';
import { Sensor } from './sensor';
import { Share } from './share';
import { SignIn } from './sign-in';
import { Tasting } from './tasting';

export { Alert, Assignment, AuditRow, Batch, BatchLink, CalendarFeed, CatalogueItem, Cellar, Entry, EntryRevision, FiningRun, Job, Lot, LotBottle, Membership, Must, MustVersion, Opening, OutboxMail, Person, Place, Sensor, Share, SignIn, Tasting };

const MODELS = [Alert, Assignment, AuditRow, Batch, BatchLink, CalendarFeed, CatalogueItem, Cellar, Entry, EntryRevision, FiningRun, Job, Lot, LotBottle, Membership, Must, MustVersion, Opening, OutboxMail, Person, Place, Sensor, Share, SignIn, Tasting];

/** Binds every model to a connection; the last one bound is the one they use. */
export function initModels(sequelize: Sequelize): void {
  for (const model of MODELS) model.register(sequelize);
}
