import { Account } from './account';
import { AlertRule } from './alert-rule';
import { Alert } from './alert';
import { AuditEntry } from './audit-entry';
import { DataCutSubject } from './data-cut-subject';
import { DataCut } from './data-cut';
import { ForecastRun } from './forecast-run';
import { Invitation } from './invitation';
import { MailMessage } from './mail-message';
import { OrganisationMember } from './organisation-member';
import { Organisation } from './organisation';
import { Person } from './person';
import { PlanDraft } from './plan-draft';
import { PlanVersion } from './plan-version';
import { PublicationAcknowledgement } from './publication-acknowledgement';
import { Publication } from './publication';
import { RateLimit } from './rate-limit';
import { Session } from './session';
import { SiteMonthRevision } from './site-month-revision';
import { SiteMonth } from './site-month';
import { Site } from './site';
import { StudyMember } from './study-member';
import { Study } from './study';
import { Verification } from './verification';

/** Every table, explicitly: discovery by folder does not survive bundling. */
export const entities = [
  Account,
  AlertRule,
  Alert,
  AuditEntry,
  DataCutSubject,
  DataCut,
  ForecastRun,
  Invitation,
  MailMessage,
  OrganisationMember,
  Organisation,
  Person,
  PlanDraft,
  PlanVersion,
  PublicationAcknowledgement,
  Publication,
  RateLimit,
  Session,
  SiteMonthRevision,
  SiteMonth,
  Site,
  StudyMember,
  Study,
  Verification,
];
