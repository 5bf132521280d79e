-- Schemas: record is append-only, work changes, queue belongs to pg-boss, session to the session store.
create schema if not exists record;
create schema if not exists work;
create schema if not exists session;
grant usage on schema record, work to hs_app, hs_worker;
grant usage on schema session to hs_app;

-- ---------------------------------------------------------------- sessions (connect-pg-simple's own form)
create table session.sessions (
  sid varchar primary key,
  sess json not null,
  expire timestamp(6) not null
);
create index sessions_expire on session.sessions (expire);
grant select, insert, update, delete on session.sessions to hs_app;

-- ---------------------------------------------------------------- laboratory, people, tokens
create table record.laboratory (
  id uuid primary key,
  name text not null,
  demo boolean not null,
  zone text not null,
  ca_certificate text not null,
  opened_at timestamptz not null
);
create unique index one_laboratory on record.laboratory ((true));

create table work.people (
  id uuid primary key,
  login text not null,
  name text not null,
  provider text not null,
  provider_account_id text not null,
  email text,
  roles text[] not null default '{}',
  active boolean not null default true,
  created_at timestamptz not null,
  unique (provider, provider_account_id)
);
create unique index people_login on work.people (lower(login));

create table work.tokens (
  id uuid primary key,
  person_id uuid not null references work.people,
  name text not null,
  scopes text[] not null,
  secret_sha256 text not null unique,
  created_at timestamptz not null,
  last_used_at timestamptz,
  expires_at timestamptz not null,
  revoked_at timestamptz
);

create table work.idempotency (
  key text not null,
  person_id uuid not null,
  method text not null,
  path text not null,
  status int,
  body json,
  created_at timestamptz not null default now(),
  primary key (person_id, key)
);

create table work.outbox (
  id uuid primary key,
  recipient text not null,
  subject text not null,
  body text not null,
  created_at timestamptz not null,
  sent_at timestamptz,
  attempts int not null default 0,
  last_error text
);

-- ---------------------------------------------------------------- notebooks and entries
create sequence work.notebook_number;
create sequence work.run_number;

create table work.notebooks (
  id uuid primary key,
  number int not null unique default nextval('work.notebook_number'),
  title text not null,
  witnesses_required int not null default 1 check (witnesses_required >= 1),
  next_entry int not null default 1,
  created_by uuid not null references work.people,
  created_at timestamptz not null
);

create table work.members (
  notebook_id uuid not null references work.notebooks,
  person_id uuid not null references work.people,
  role text not null check (role in ('experimentalist', 'supervisor', 'auditor', 'manager')),
  keeper boolean not null default false,
  added_at timestamptz not null,
  primary key (notebook_id, person_id)
);

create table work.entries (
  id uuid primary key,
  notebook_id uuid not null references work.notebooks,
  serial int not null,
  title text not null,
  experiment text not null,
  run_at timestamptz not null,
  work_date date not null,
  late_remark text,
  important boolean not null default false,
  state text not null default 'draft' check (state in ('draft', 'submitted', 'sealed', 'withdrawn')),
  phase text not null default 'writing'
    check (phase in ('writing', 'collecting', 'returned', 'with-witness', 'sealed', 'withdrawn')),
  revision int not null default 0,
  save_number int not null default 0,
  content_sha256 text not null,
  -- The body that the living signatures share (record.bodies); null while nobody has signed or prepared.
  body_sha256 text,
  amends_entry_id uuid references work.entries,
  amends_body_sha256 text,
  next_label int not null default 1,
  submitted_at timestamptz,
  created_by uuid not null references work.people,
  created_at timestamptz not null,
  updated_at timestamptz not null,
  unique (notebook_id, serial)
);
create index entries_waiting on work.entries (state, submitted_at);

-- Every save of the text, compressed; no ledger event (rulings 27).
create table record.saves (
  entry_id uuid not null references work.entries,
  number int not null,
  person_id uuid not null,
  token_id uuid,
  saved_at timestamptz not null,
  content_gzip bytea not null,
  content_sha256 text not null,
  primary key (entry_id, number)
);

create table record.revisions (
  entry_id uuid not null references work.entries,
  revision int not null,
  person_id uuid not null,
  token_id uuid,
  at timestamptz not null,
  cause text not null,
  save_number int not null,
  content_sha256 text not null,
  primary key (entry_id, revision)
);

-- ---------------------------------------------------------------- apparatus, runs, files
create table work.apparatus (
  id uuid primary key,
  version int not null,
  kind text not null,
  name text not null,
  figures json not null,
  created_at timestamptz not null
);

create table work.runs (
  id uuid primary key,
  number int not null unique default nextval('work.run_number'),
  notebook_id uuid not null references work.notebooks,
  entry_id uuid references work.entries,
  experiment text not null,
  started_at timestamptz not null,
  duration_ps bigint,
  conditions json not null default '[]',
  apparatus json not null default '[]',
  cautions json not null default '[]',
  created_by uuid not null references work.people,
  created_at timestamptz not null
);

create table work.files (
  id uuid primary key,
  entry_id uuid references work.entries,
  run_id uuid references work.runs,
  name text not null,
  size bigint not null,
  sha256 text not null,
  sha512 text not null,
  object_key text not null unique,
  object_version text,
  state text not null check (state in ('stored', 'verified', 'mismatch', 'missing')),
  uploaded_by uuid not null references work.people,
  via text not null check (via in ('browser', 'token')),
  uploaded_at timestamptz not null,
  reading_status text not null default 'pending' check (reading_status in ('pending', 'ready', 'unreadable')),
  reading_format text,
  reading_version int,
  reading_options json,
  reading_sha256 text,
  reading_summary json,
  reading_detail text,
  -- Who chose the reading; null when it was found by itself.
  reading_by uuid,
  columns_key text,
  check (entry_id is not null or run_id is not null)
);
create index files_entry on work.files (entry_id);
create index files_run on work.files (run_id);
create index files_digest on work.files (sha256);

-- ---------------------------------------------------------------- calculations
create table record.results (
  sha256 text primary key,
  result bytea not null,
  created_at timestamptz not null default now()
);

create table work.calculations (
  id uuid primary key,
  entry_id uuid not null references work.entries,
  label int not null,
  kind text not null,
  version int not null,
  engine text not null,
  status text not null check (status in ('queued', 'running', 'done', 'failed', 'cancelled')),
  progress json,
  parameters json not null,
  inputs json not null,
  -- SHA-256 over kind, version, engine, parameters and input digests with their readings.
  cache_key text,
  result_sha256 text references record.results,
  figures json not null default '[]',
  notes json not null default '[]',
  worker text,
  error json,
  supersedes uuid references work.calculations,
  created_by uuid not null references work.people,
  token_id uuid,
  created_at timestamptz not null,
  started_at timestamptz,
  finished_at timestamptz
);
create index calculations_entry on work.calculations (entry_id);
create index calculations_cache on work.calculations (cache_key) where status = 'done';

-- ---------------------------------------------------------------- keys and signatures
create table record.enrolments (
  id uuid primary key,
  person_id uuid not null references work.people,
  sha256 text not null unique,
  document bytea not null,
  signature bytea not null,
  public_key bytea not null,
  root boolean not null,
  enrolled_at timestamptz not null
);
create unique index one_root on record.enrolments (root) where root;

create table record.endorsements (
  id uuid primary key,
  enrolment_id uuid not null references record.enrolments,
  endorser_id uuid not null references work.people,
  sha256 text not null unique,
  document bytea not null,
  signature bytea not null,
  endorsed_at timestamptz not null
);

create table record.certificates (
  sha256 text primary key,
  enrolment_id uuid not null references record.enrolments,
  serial text not null unique,
  pem text not null,
  not_before timestamptz not null,
  not_after timestamptz not null,
  certified_at timestamptz not null
);

create table record.revocations (
  enrolment_id uuid primary key references record.enrolments,
  reason text not null,
  revoked_at timestamptz not null
);

-- What the server keeps of a private key: wrapped by the passphrase in the browser, and once more at rest.
create table work.signing_keys (
  enrolment_id uuid primary key references record.enrolments,
  person_id uuid not null references work.people,
  kdf json not null,
  wrapped_key bytea not null,
  iv bytea not null,
  proof_digest bytea not null,
  failures int not null default 0,
  locked_until timestamptz
);

create table work.pending_documents (
  id uuid primary key,
  person_id uuid not null references work.people,
  kind text not null check (kind in ('enrolment', 'endorsement')),
  document bytea not null,
  expires_at timestamptz not null
);

create table record.bodies (
  sha256 text primary key,
  entry_id uuid not null references work.entries,
  body bytea not null,
  built_at timestamptz not null
);

create table work.prepared_records (
  sha256 text primary key,
  entry_id uuid not null references work.entries,
  person_id uuid not null references work.people,
  meaning text not null,
  -- What the prepared bytes depend on; the same state gives the same bytes until they expire.
  state_key text not null,
  record bytea not null,
  body_sha256 text not null,
  created_at timestamptz not null,
  expires_at timestamptz not null
);
create index prepared_records_state on work.prepared_records (entry_id, person_id, meaning, state_key);

create table record.signatures (
  id uuid primary key,
  entry_id uuid not null references work.entries,
  person_id uuid not null references work.people,
  meaning text not null check (meaning in ('authorship', 'witness-read', 'witness-present')),
  record_sha256 text not null unique,
  record bytea not null,
  body_sha256 text not null references record.bodies,
  signature bytea not null,
  signature_sha256 text not null,
  certificate_sha256 text not null references record.certificates,
  signed_at timestamptz not null,
  event_sequence bigint not null
);
create index signatures_entry on record.signatures (entry_id);

create table record.voidings (
  record_sha256 text primary key references record.signatures (record_sha256),
  voided_at timestamptz not null,
  event_sequence bigint not null
);

create table record.returns (
  id uuid primary key,
  entry_id uuid not null references work.entries,
  kind text not null check (kind in ('returned', 'reopened')),
  by_person uuid not null references work.people,
  reason text not null,
  at timestamptz not null
);

create table record.author_exceptions (
  entry_id uuid not null references work.entries,
  person_id uuid not null references work.people,
  reason text not null,
  by_person uuid not null references work.people,
  at timestamptz not null,
  primary key (entry_id, person_id)
);

create table record.time_stamps (
  -- SHA-256 of the 64 signature bytes that the stamp covers (an entry's signature or a head's).
  signature_sha256 text primary key,
  token bytea not null,
  gen_time timestamptz not null,
  authority text not null,
  independent boolean not null,
  stamped_at timestamptz not null
);

-- What a witness opened since the entry was submitted, from the witness's own requests (rulings 17).
create table work.openings (
  entry_id uuid not null references work.entries,
  person_id uuid not null references work.people,
  kind text not null check (kind in ('text', 'calculation', 'file')),
  object_id uuid not null,
  submitted_at timestamptz not null,
  at timestamptz not null,
  primary key (entry_id, person_id, kind, object_id, submitted_at)
);

-- ---------------------------------------------------------------- ledger
create table record.events (
  sequence bigint primary key,
  at timestamptz not null,
  action text not null,
  actor_id uuid,
  subject_kind text not null,
  subject_id uuid not null,
  subject_sequence bigint not null,
  canonical bytea not null,
  digest text not null unique,
  leaf_hash text not null,
  unique (subject_kind, subject_id, subject_sequence)
);
create index events_action on record.events (action);

-- The one row that says where the chain stands; changed only by the trigger on record.events.
create table record.ledger_state (
  one boolean primary key default true check (one),
  tree_size bigint not null,
  last_digest text not null,
  last_at timestamptz,
  -- Roots of the perfect subtrees, largest first (RFC 9162 hashing).
  frontier text[] not null
);
insert into record.ledger_state values (true, 0, repeat('0', 64), null, '{}');

create table record.heads (
  tree_size bigint primary key,
  head bytea not null,
  signature bytea not null,
  signature_sha256 text not null,
  root_hash text not null,
  crl text not null,
  made_at timestamptz not null
);

create table record.ledger_keys (
  sha256 text primary key,
  position int not null unique,
  public_key bytea not null,
  rotation bytea,
  since timestamptz not null
);

create table record.tsa_roots (
  sha256 text primary key,
  since timestamptz not null
);

-- The evidence set of a sealed entry, made once.
create table record.renditions (
  entry_id uuid not null references work.entries,
  -- Path in the entry's folder of the bundle, for example entry.pdf or calculations/C1/result.json.
  path text not null,
  sha256 text not null,
  sha512 text not null,
  size bigint not null,
  object_key text not null,
  object_version text,
  primary key (entry_id, path)
);

create table work.exports (
  id uuid primary key,
  person_id uuid not null references work.people,
  notebook_id uuid references work.notebooks,
  entry_ids uuid[] not null,
  without_raw boolean not null default false,
  status text not null check (status in ('queued', 'running', 'waiting-for-time-stamp', 'done', 'failed')),
  name text,
  object_key text,
  object_version text,
  size bigint,
  sha256 text,
  error json,
  created_at timestamptz not null,
  expires_at timestamptz not null
);

-- ---------------------------------------------------------------- what the database itself refuses
create function record.refuse_change() returns trigger language plpgsql as $$
begin
  raise exception '% on %.% is refused: what is recorded is never changed', tg_op, tg_table_schema, tg_table_name
    using errcode = 'restrict_violation';
end $$;

do $$
declare t text;
begin
  for t in select tablename from pg_tables where schemaname = 'record' and tablename <> 'ledger_state' loop
    execute format('create trigger refuse_row before update or delete on record.%I for each row execute function record.refuse_change()', t);
    execute format('create trigger refuse_truncate before truncate on record.%I for each statement execute function record.refuse_change()', t);
  end loop;
end $$;
create trigger refuse_truncate before truncate or delete on record.ledger_state
  for each statement execute function record.refuse_change();

-- Appending an event: the row must continue the chain, its digest must be that of its canonical bytes, its columns must
-- say what the bytes say. The state row and the Merkle frontier move with it in the same transaction.
create function record.append_event() returns trigger language plpgsql security definer set search_path = pg_catalog as $$
declare
  state record.ledger_state;
  event jsonb;
  node bytea;
  n bigint;
  parts text[];
begin
  if session_user = 'hs_worker' and new.action <> 'calculation.finished' then
    raise exception 'a worker may record only calculation.finished, not %', new.action using errcode = 'insufficient_privilege';
  end if;
  select * into state from record.ledger_state for update;
  event := convert_from(new.canonical, 'UTF8')::jsonb;
  node := sha256('\x00'::bytea || new.canonical);
  if new.sequence <> state.tree_size + 1 or (event ->> 'sequence')::bigint <> new.sequence then
    raise exception 'event % does not follow %', new.sequence, state.tree_size using errcode = 'integrity_constraint_violation';
  end if;
  if event ->> 'previous' <> state.last_digest or encode(sha256(new.canonical), 'hex') <> new.digest
     or encode(node, 'hex') <> new.leaf_hash then
    raise exception 'event % does not continue the chain', new.sequence using errcode = 'integrity_constraint_violation';
  end if;
  if event ->> 'action' <> new.action or event #>> '{subject,id}' <> new.subject_id::text
     or event #>> '{subject,kind}' <> new.subject_kind or (event ->> 'subjectSequence')::bigint <> new.subject_sequence
     or (event ->> 'time')::timestamptz <> new.at or (state.last_at is not null and new.at < state.last_at) then
    raise exception 'event % says something else than its columns', new.sequence using errcode = 'integrity_constraint_violation';
  end if;
  parts := state.frontier;
  n := state.tree_size;
  while n & 1 = 1 loop
    node := sha256('\x01'::bytea || decode(parts[array_length(parts, 1)], 'hex') || node);
    parts := parts[1:array_length(parts, 1) - 1];
    n := n >> 1;
  end loop;
  update record.ledger_state
    set tree_size = new.sequence, last_digest = new.digest, last_at = new.at, frontier = parts || encode(node, 'hex');
  return new;
end $$;
create trigger append_event before insert on record.events for each row execute function record.append_event();

-- Content is locked unless the entry is being written.
create function record.refuse_save() returns trigger language plpgsql security definer set search_path = pg_catalog as $$
declare found_phase text;
begin
  select e.phase into found_phase from work.entries e where e.id = new.entry_id;
  if found_phase not in ('writing', 'returned') then
    raise exception 'the entry is %: its content takes no write', found_phase using errcode = 'restrict_violation';
  end if;
  return new;
end $$;
create trigger refuse_save before insert on record.saves for each row execute function record.refuse_save();

-- A sealed or withdrawn entry and what hangs on it stay as they are.
create function work.refuse_sealed_entry() returns trigger language plpgsql as $$
begin
  if old.state in ('sealed', 'withdrawn') then
    raise exception 'entry % is %: it cannot change', old.id, old.state using errcode = 'restrict_violation';
  end if;
  return case tg_op when 'DELETE' then old else new end;
end $$;
create trigger refuse_sealed before update or delete on work.entries for each row execute function work.refuse_sealed_entry();

create function work.entry_is_closed(entry uuid) returns boolean language sql stable security definer set search_path = pg_catalog as $$
  select coalesce((select e.state in ('sealed', 'withdrawn') from work.entries e where e.id = entry), false)
$$;

create function work.refuse_of_sealed() returns trigger language plpgsql as $$
begin
  if tg_op <> 'INSERT' and work.entry_is_closed(old.entry_id) then
    raise exception '% of a sealed entry is refused', tg_table_name using errcode = 'restrict_violation';
  end if;
  if tg_op <> 'DELETE' and work.entry_is_closed(new.entry_id) then
    raise exception '% for a sealed entry is refused', tg_table_name using errcode = 'restrict_violation';
  end if;
  return case tg_op when 'DELETE' then old else new end;
end $$;
create trigger refuse_of_sealed before insert or update or delete on work.runs for each row execute function work.refuse_of_sealed();
create trigger refuse_of_sealed before insert or update or delete on work.calculations for each row execute function work.refuse_of_sealed();

-- Of a file in a sealed entry only the finding of a later re-read may change.
create function work.refuse_file_of_sealed() returns trigger language plpgsql as $$
declare entry uuid;
begin
  if tg_op = 'INSERT' then
    entry := coalesce(new.entry_id, (select r.entry_id from work.runs r where r.id = new.run_id));
  else
    entry := coalesce(old.entry_id, (select r.entry_id from work.runs r where r.id = old.run_id));
  end if;
  if work.entry_is_closed(entry) then
    if tg_op = 'UPDATE' and (to_jsonb(old) - 'state') = (to_jsonb(new) - 'state') then return new; end if;
    raise exception 'files of a sealed entry are kept as they are' using errcode = 'restrict_violation';
  end if;
  return case tg_op when 'DELETE' then old else new end;
end $$;
create trigger refuse_of_sealed before insert or update or delete on work.files for each row execute function work.refuse_file_of_sealed();

-- ---------------------------------------------------------------- rights
grant select, insert on all tables in schema record to hs_app;
revoke insert on record.ledger_state from hs_app;
grant select, insert, update on all tables in schema work to hs_app;
grant delete on work.members, work.idempotency, work.pending_documents, work.prepared_records, work.outbox to hs_app;
grant usage on all sequences in schema work to hs_app;

-- A worker reads inputs, moves the job it holds, adds results; nothing in signatures, revisions or keys.
grant select on work.files, work.runs, work.calculations, work.entries to hs_worker;
grant select (id, name) on work.people to hs_worker;
grant update (status, progress, result_sha256, figures, notes, worker, error, cache_key, started_at, finished_at, inputs)
  on work.calculations to hs_worker;
grant update (reading_status, reading_format, reading_version, reading_options, reading_sha256, reading_summary,
  reading_detail, columns_key) on work.files to hs_worker;
grant select on record.ledger_state to hs_worker;
grant select, insert on record.results, record.events to hs_worker;
