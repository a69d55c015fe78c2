import { Migration } from '@mikro-orm/migrations';

/** Tables that hold one organisation's data: row-level security is forced on each of them. */
const TENANT_TABLES = [
  'organisation_member',
  'study',
  'study_member',
  'invitation',
  'plan_draft',
  'plan_version',
  'site',
  'site_month',
  'site_month_revision',
  'data_cut',
  'data_cut_subject',
  'forecast_run',
  'publication',
  'publication_acknowledgement',
  'alert_rule',
  'alert',
  'mail_message',
  'audit_head',
  'audit_entry',
];

/** Rows of these tables are never changed once written: what was said stays said. */
const INSERT_ONLY_TABLES = [
  'plan_version',
  'site_month_revision',
  'data_cut',
  'data_cut_subject',
  'publication',
  'publication_acknowledgement',
  'alert',
  'audit_entry',
];

export class InitialSchema extends Migration {
  override async up(): Promise<void> {
    this.addSql(identityTables);
    this.addSql(tenancyTables);
    this.addSql(studyTables);
    this.addSql(forecastTables);
    this.addSql(auditTables);
    for (const table of TENANT_TABLES) {
      this.addSql(`alter table ${table} enable row level security`);
      this.addSql(`alter table ${table} force row level security`);
      this.addSql(
        `create policy tenant on ${table} using (organisation_id = nullif(current_setting('app.organisation_id', true), '')::uuid) ` +
          `with check (organisation_id = nullif(current_setting('app.organisation_id', true), '')::uuid)`,
      );
    }
    this.addSql(ownMembershipPolicies);
    for (const table of INSERT_ONLY_TABLES) {
      this.addSql(
        `create trigger insert_only before update or delete on ${table} for each row execute function refuse_change()`,
      );
      this.addSql(
        `create trigger insert_only_truncate before truncate on ${table} for each statement execute function refuse_change()`,
      );
    }
    this.addSql(grants);
    for (const table of INSERT_ONLY_TABLES) {
      this.addSql(`revoke update, delete on ${table} from kalends_app`);
    }
  }
}

const identityTables = /* sql */ `
create table person (
  id uuid primary key, name text not null check (length(name) between 1 and 200), email text not null, email_verified boolean not null default false,
  image text, created_at timestamptz not null, updated_at timestamptz not null);
create unique index person_email on person (lower(email));
create table session (
  id uuid primary key, token text not null unique, user_id uuid not null references person (id) on delete cascade deferrable initially deferred,
  expires_at timestamptz not null, ip_address text, user_agent text, created_at timestamptz not null, updated_at timestamptz not null);
create index session_by_user on session (user_id);
create table account (
  id uuid primary key, account_id text not null, provider_id text not null, user_id uuid not null references person (id) on delete cascade deferrable initially deferred,
  access_token text, refresh_token text, id_token text, access_token_expires_at timestamptz, refresh_token_expires_at timestamptz,
  scope text, password text, created_at timestamptz not null, updated_at timestamptz not null, unique (provider_id, account_id));
create index account_by_user on account (user_id);
create table verification (
  id uuid primary key, identifier text not null, value text not null, expires_at timestamptz not null,
  created_at timestamptz not null, updated_at timestamptz not null);
create index verification_identifier on verification (identifier);
create table rate_limit (id uuid primary key, key text not null unique, count integer not null, last_request bigint not null);
`;

const tenancyTables = /* sql */ `
create table organisation (
  id uuid primary key, name text not null check (length(name) between 1 and 200), is_demonstration boolean not null default false, created_at timestamptz not null);
create table organisation_member (
  id uuid primary key, organisation_id uuid not null references organisation (id), person_id uuid not null references person (id) deferrable initially deferred,
  role text not null check (role in ('owner', 'member')), created_at timestamptz not null,
  unique (organisation_id, id), unique (organisation_id, person_id));
create index organisation_member_person on organisation_member (person_id);
create table study (
  id uuid primary key, organisation_id uuid not null references organisation (id), code text not null check (code ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,39}$'),
  title text not null, sponsor_name text not null, created_at timestamptz not null, created_by uuid not null references person (id) deferrable initially deferred, version integer not null default 1,
  unique (organisation_id, id), unique (organisation_id, code));
create table site (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, code text not null, name text not null, city text not null, country text not null check (country ~ '^[A-Z]{2}$'),
  planned_earliest date, planned_likely date, planned_latest date, activated_on date, closed_on date, cap integer check (cap >= 1),
  created_at timestamptz not null, version integer not null default 1,
  check (planned_earliest <= planned_likely and planned_likely <= planned_latest), check (closed_on >= activated_on),
  unique (organisation_id, id), unique (organisation_id, study_id, code),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred);
create unique index site_code on site (organisation_id, study_id, lower(code));
create table study_member (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, person_id uuid not null references person (id) deferrable initially deferred,
  role text not null check (role in ('statistician', 'manager', 'coordinator', 'sponsor')), site_id uuid, created_at timestamptz not null,
  check ((role = 'coordinator') = (site_id is not null)),
  unique (organisation_id, id), unique (organisation_id, study_id, person_id),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, site_id) references site (organisation_id, id) deferrable initially deferred);
create index study_member_person on study_member (person_id);
create table invitation (
  id uuid primary key, organisation_id uuid not null references organisation (id), study_id uuid, site_id uuid,
  role text not null check (role in ('owner', 'statistician', 'manager', 'coordinator', 'sponsor')), email text not null, name text not null, token_hash text not null unique,
  expires_at timestamptz not null, accepted_at timestamptz, revoked_at timestamptz, invited_by uuid not null references person (id) deferrable initially deferred, created_at timestamptz not null,
  check ((role = 'owner') = (study_id is null)), check ((role = 'coordinator') = (site_id is not null)),
  unique (organisation_id, id),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, site_id) references site (organisation_id, id) deferrable initially deferred);
`;

const studyTables = /* sql */ `
create table plan_draft (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, sections jsonb not null, updated_at timestamptz not null, updated_by uuid not null references person (id) deferrable initially deferred,
  version integer not null default 1, unique (organisation_id, id), unique (organisation_id, study_id),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred);
create table plan_version (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, number integer not null check (number >= 1), plan jsonb not null,
  reason_kind text, reason text, created_at timestamptz not null, created_by uuid not null references person (id) deferrable initially deferred,
  unique (organisation_id, id), unique (organisation_id, study_id, number),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred);
create table site_month (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, site_id uuid not null, month date not null check (extract(day from month) = 1),
  screened integer check (screened >= 0), failed integer check (failed >= 0), randomised integer check (randomised >= 0), events integer check (events >= 0), withdrawn integer check (withdrawn >= 0),
  logged_at timestamptz not null, logged_by uuid not null references person (id) deferrable initially deferred, version integer not null default 1,
  unique (organisation_id, id), unique (organisation_id, site_id, month),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, site_id) references site (organisation_id, id) deferrable initially deferred);
create index site_month_study on site_month (organisation_id, study_id, month);
create table site_month_revision (
  id uuid primary key, organisation_id uuid not null, site_month_id uuid not null,
  field text not null check (field in ('screened', 'failed', 'randomised', 'events', 'withdrawn')), old_value integer, new_value integer,
  reason_kind text, reason text, changed_at timestamptz not null, changed_by uuid not null references person (id) deferrable initially deferred,
  unique (organisation_id, id),
  foreign key (organisation_id, site_month_id) references site_month (organisation_id, id) deferrable initially deferred);
create index site_month_revision_entry on site_month_revision (organisation_id, site_month_id, changed_at);
create table data_cut (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, number integer not null check (number >= 1), cutoff_on date not null,
  kind text not null check (kind in ('subjects', 'aggregate')), file_name text, file_key text, file_sha256 text, file_bytes integer,
  counts jsonb not null, aggregate jsonb, differences jsonb not null, note text, accepted_at timestamptz not null, accepted_by uuid not null references person (id) deferrable initially deferred,
  unique (organisation_id, id), unique (organisation_id, study_id, number),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred);
create table data_cut_subject (
  id uuid primary key, organisation_id uuid not null, data_cut_id uuid not null, subject_id text not null, site_code text not null, randomised_on date not null,
  status text not null check (status in ('event', 'event-pending', 'withdrawn', 'completed', 'at-risk')), status_on date not null check (status_on >= randomised_on),
  unique (organisation_id, data_cut_id, subject_id),
  foreign key (organisation_id, data_cut_id) references data_cut (organisation_id, id) deferrable initially deferred);
`;

const forecastTables = /* sql */ `
create table forecast_run (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, number integer not null check (number >= 1),
  status text not null check (status in ('queued', 'running', 'done', 'failed', 'cancelled')), cutoff_on date not null, plan_version_id uuid not null, data_cut_id uuid,
  draws integer not null, seed bigint not null, draws_done integer not null default 0, study_file text not null, study_sha256 text not null, forecast_file text, forecast jsonb, engine_version text, failure jsonb,
  requested_at timestamptz not null, requested_by uuid not null references person (id) deferrable initially deferred, started_at timestamptz, heartbeat_at timestamptz, finished_at timestamptz, version integer not null default 1,
  check ((status = 'done') = (forecast_file is not null)), check (status <> 'failed' or failure is not null),
  unique (organisation_id, id), unique (organisation_id, study_id, number),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, plan_version_id) references plan_version (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, data_cut_id) references data_cut (organisation_id, id) deferrable initially deferred);
create table publication (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, run_id uuid not null, number integer not null check (number >= 1), note text not null, content jsonb not null, audit_digest text not null,
  published_at timestamptz not null, published_by uuid not null references person (id) deferrable initially deferred,
  unique (organisation_id, id), unique (organisation_id, study_id, number), unique (organisation_id, run_id),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, run_id) references forecast_run (organisation_id, id) deferrable initially deferred);
create table publication_acknowledgement (
  id uuid primary key, organisation_id uuid not null, publication_id uuid not null, person_id uuid not null references person (id) deferrable initially deferred, acknowledged_at timestamptz not null,
  unique (organisation_id, publication_id, person_id),
  foreign key (organisation_id, publication_id) references publication (organisation_id, id) deferrable initially deferred);
create table alert_rule (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, milestone_code text not null, condition jsonb not null, recipients jsonb not null, is_active boolean not null default true,
  created_at timestamptz not null, created_by uuid not null references person (id) deferrable initially deferred, version integer not null default 1,
  unique (organisation_id, id),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred);
create table alert (
  id uuid primary key, organisation_id uuid not null, study_id uuid not null, rule_id uuid not null, publication_id uuid not null, content jsonb not null, raised_at timestamptz not null,
  unique (organisation_id, id), unique (organisation_id, rule_id, publication_id),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, rule_id) references alert_rule (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, publication_id) references publication (organisation_id, id) deferrable initially deferred);
create table mail_message (
  id uuid primary key, organisation_id uuid not null references organisation (id), study_id uuid, alert_id uuid, recipient text not null, recipient_name text not null, subject text not null, template jsonb not null,
  message_id text not null unique, state text not null check (state in ('queued', 'sending', 'sent', 'bounced', 'failed')), attempts integer not null default 0, last_error text,
  created_at timestamptz not null, claimed_at timestamptz, sent_at timestamptz,
  unique (organisation_id, id), unique (organisation_id, alert_id, recipient),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred,
  foreign key (organisation_id, alert_id) references alert (organisation_id, id) deferrable initially deferred);
`;

const auditTables = /* sql */ `
create table audit_head (organisation_id uuid primary key references organisation (id), sequence bigint not null, digest text not null);
create table audit_entry (
  id uuid primary key, organisation_id uuid not null references organisation (id), sequence bigint not null, study_id uuid, at timestamptz not null,
  actor_id uuid, actor_name text not null, actor_role text not null, action text not null, record_type text not null, record_id text not null,
  changes jsonb not null, reason text, source text not null, request_id text, previous_digest text not null, digest text not null,
  unique (organisation_id, id), unique (organisation_id, sequence),
  foreign key (organisation_id, study_id) references study (organisation_id, id) deferrable initially deferred);
create index audit_entry_study on audit_entry (organisation_id, study_id, sequence desc);

create function chain_audit_entry() returns trigger language plpgsql security definer set search_path = public as $$
declare head audit_head%rowtype;
begin
  insert into audit_head (organisation_id, sequence, digest) values (new.organisation_id, 0, repeat('0', 64)) on conflict do nothing;
  select * into head from audit_head where organisation_id = new.organisation_id for update;
  new.sequence := head.sequence + 1;
  new.previous_digest := head.digest;
  new.digest := encode(sha256(convert_to(concat_ws('|', head.digest, new.sequence, new.organisation_id, coalesce(new.study_id::text, ''),
    to_char(new.at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US'), coalesce(new.actor_id::text, ''), new.actor_name, new.actor_role,
    new.action, new.record_type, new.record_id, new.changes::text, coalesce(new.reason, ''), new.source, coalesce(new.request_id, '')), 'UTF8')), 'hex');
  update audit_head set sequence = new.sequence, digest = new.digest where organisation_id = new.organisation_id;
  return new;
end $$;
create trigger chain before insert on audit_entry for each row execute function chain_audit_entry();

create function refuse_change() returns trigger language plpgsql as $$
begin
  raise exception '% rows are kept as they were written', tg_table_name using errcode = 'restrict_violation';
end $$;
`;

/* A person finds their own memberships (and only theirs) before an organisation is known; that is how a session becomes a scope. */
const ownMembershipPolicies = /* sql */ `
create policy own_membership on organisation_member for select using (person_id = nullif(current_setting('app.person_id', true), '')::uuid);
create policy own_membership on study_member for select using (person_id = nullif(current_setting('app.person_id', true), '')::uuid);
create policy own_study on study for select using (
  exists (select 1 from study_member m where m.organisation_id = study.organisation_id and m.study_id = study.id and m.person_id = nullif(current_setting('app.person_id', true), '')::uuid)
  or exists (select 1 from organisation_member o where o.organisation_id = study.organisation_id and o.role = 'owner' and o.person_id = nullif(current_setting('app.person_id', true), '')::uuid));
create policy own_organisation on organisation for select using (
  exists (select 1 from study_member m where m.organisation_id = organisation.id and m.person_id = nullif(current_setting('app.person_id', true), '')::uuid)
  or exists (select 1 from organisation_member o where o.organisation_id = organisation.id and o.person_id = nullif(current_setting('app.person_id', true), '')::uuid));
create policy tenant on organisation using (id = nullif(current_setting('app.organisation_id', true), '')::uuid)
  with check (id = nullif(current_setting('app.organisation_id', true), '')::uuid);
alter table organisation enable row level security;
alter table organisation force row level security;
create policy invited on invitation for select using (token_hash = nullif(current_setting('app.invitation_hash', true), ''));
`;

const grants = /* sql */ `
do $$ begin
  if not exists (select from pg_roles where rolname = 'kalends_app') then create role kalends_app nologin; end if;
end $$;
grant usage on schema public to kalends_app;
grant select, insert, update, delete on all tables in schema public to kalends_app;
revoke delete on organisation, study, site, site_month, forecast_run, mail_message, invitation, person from kalends_app;
revoke insert, update, delete on mikro_orm_migrations, audit_head from kalends_app;
`;
