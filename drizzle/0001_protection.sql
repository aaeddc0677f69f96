-- Roles. A cluster that is already prepared has them with a password; elsewhere they are made without login.
do $$
declare r text;
begin
  foreach r in array array['ebbmark_web','ebbmark_worker','ebbmark_portal','ebbmark_verifier','ebbmark_audit'] loop
    if not exists (select from pg_roles where rolname = r) then execute format('create role %I nologin', r); end if;
  end loop;
  if not pg_has_role(current_user, 'ebbmark_audit', 'member') then
    execute format('grant ebbmark_audit to %I', current_user);
  end if;
end $$;
--> statement-breakpoint
-- The register: append-only and hash-chained (see DEVELOPERS.md, Decisions). Its owner has no login.
create schema audit;
--> statement-breakpoint
create table audit.head (
  one boolean primary key default true check (one),
  seq bigint not null,
  hash bytea not null check (octet_length(hash) = 32)
);
--> statement-breakpoint
insert into audit.head values (true, 0, sha256(convert_to('ebbmark-register-v1', 'UTF8')));
--> statement-breakpoint
create table audit.entry (
  seq bigint primary key,
  at timestamptz not null,
  actor text not null,
  action text not null,
  subject text not null,
  canonical text not null check (octet_length(canonical) <= 65536),
  prev_hash bytea not null check (octet_length(prev_hash) = 32),
  hash bytea not null unique check (octet_length(hash) = 32)
);
--> statement-breakpoint
create index entry_subject on audit.entry (subject, seq);
--> statement-breakpoint
create function audit.digest(prev bytea, n bigint, body text) returns bytea language sql immutable as $$
  select sha256(convert_to('v1', 'UTF8') || prev || int8send(n) || convert_to(body, 'UTF8'))
$$;
--> statement-breakpoint
create function audit.append(body text) returns bigint
language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
declare h audit.head%rowtype; j jsonb := body::jsonb; d bytea;
begin
  if j->>'at' is null or j->>'actor' is null or j->>'action' is null or j->>'subject' is null then
    raise exception 'a register entry lacks a required member' using errcode = '23514';
  end if;
  select * into strict h from audit.head for update;
  d := audit.digest(h.hash, h.seq + 1, body);
  insert into audit.entry (seq, at, actor, action, subject, canonical, prev_hash, hash)
  values (h.seq + 1, (j->>'at')::timestamptz, j->>'actor', j->>'action', j->>'subject', body, h.hash, d);
  update audit.head set seq = h.seq + 1, hash = d;
  return h.seq + 1;
end $$;
--> statement-breakpoint
create function audit.deny() returns trigger language plpgsql as $$
begin raise exception 'the register is append-only' using errcode = '42501'; end $$;
--> statement-breakpoint
create trigger entry_no_change before update or delete on audit.entry for each row execute function audit.deny();
--> statement-breakpoint
create trigger entry_no_truncate before truncate on audit.entry for each statement execute function audit.deny();
--> statement-breakpoint
alter table audit.entry enable always trigger entry_no_change;
--> statement-breakpoint
alter table audit.entry enable always trigger entry_no_truncate;
--> statement-breakpoint
do $$
begin
  execute format('grant create on database %I to ebbmark_audit', current_database());
  alter schema audit owner to ebbmark_audit;
  alter table audit.head owner to ebbmark_audit;
  alter table audit.entry owner to ebbmark_audit;
  alter function audit.digest(bytea, bigint, text) owner to ebbmark_audit;
  alter function audit.append(text) owner to ebbmark_audit;
  alter function audit.deny() owner to ebbmark_audit;
  execute format('revoke create on database %I from ebbmark_audit', current_database());
end $$;
--> statement-breakpoint
revoke all on all functions in schema audit from public;
--> statement-breakpoint
grant usage on schema audit to ebbmark_web, ebbmark_worker, ebbmark_verifier;
--> statement-breakpoint
grant execute on function audit.append(text) to ebbmark_web, ebbmark_worker;
--> statement-breakpoint
grant select on audit.entry, audit.head to ebbmark_web, ebbmark_verifier;
--> statement-breakpoint
grant execute on function audit.digest(bytea, bigint, text) to ebbmark_verifier;
--> statement-breakpoint
-- Frozen rows: no update, no delete, no truncate, whoever asks.
create function refuse_change() returns trigger language plpgsql as $$
begin
  raise exception 'rows of % never change', tg_table_name using errcode = '42501';
end $$;
--> statement-breakpoint
do $$
declare t text;
begin
  foreach t in array array['frozen_assessments','briefing_versions','reviews','signature_voids','releases','publications','release_events'] loop
    execute format('create trigger no_change before update or delete on %I for each row execute function refuse_change()', t);
    execute format('create trigger no_truncate before truncate on %I for each statement execute function refuse_change()', t);
    execute format('alter table %I enable always trigger no_change', t);
    execute format('alter table %I enable always trigger no_truncate', t);
  end loop;
end $$;
--> statement-breakpoint
-- A frozen assessment's working row is closed with it.
create function refuse_change_when_frozen() returns trigger language plpgsql as $$
begin
  if exists (select from frozen_assessments f where f.assessment_id = old.id) then
    raise exception 'assessment % is frozen', old.number using errcode = '42501';
  end if;
  return case when tg_op = 'DELETE' then old else new end;
end $$;
--> statement-breakpoint
create trigger closed_when_frozen before update or delete on assessments for each row execute function refuse_change_when_frozen();
--> statement-breakpoint
-- A signature binds the version as it stands, in review, and never comes from somebody who wrote any of it.
create function check_review() returns trigger language plpgsql as $$
declare v briefing_versions%rowtype; b briefings%rowtype;
begin
  select * into strict v from briefing_versions where id = new.version_id;
  select * into strict b from briefings where id = v.briefing_id for update;
  if new.reviewer = any (v.authors) then
    raise exception 'an author may not review their own work' using errcode = '42501';
  end if;
  if new.content_hash <> v.content_hash then
    raise exception 'the review names another content than the version' using errcode = '42501';
  end if;
  if b.state <> 'legalReview' or b.version_number <> v.number then
    raise exception 'the version is not in review' using errcode = '42501';
  end if;
  return new;
end $$;
--> statement-breakpoint
create trigger review_is_lawful before insert on reviews for each row execute function check_review();
--> statement-breakpoint
-- Nothing is published without a signature that still stands, nor by the one who signed.
create function check_release() returns trigger language plpgsql as $$
declare v briefing_versions%rowtype; r reviews%rowtype;
begin
  select * into strict v from briefing_versions where id = new.version_id;
  select * into r from reviews where version_id = new.version_id and decision = 'signed';
  if not found or exists (select from signature_voids s where s.review_id = r.id) then
    raise exception 'the version has no signature that stands' using errcode = '42501';
  end if;
  if new.content_hash <> v.content_hash or r.content_hash <> v.content_hash then
    raise exception 'the release names another content than the signature' using errcode = '42501';
  end if;
  if new.published_by = r.reviewer then
    raise exception 'the signer may not publish' using errcode = '42501';
  end if;
  return new;
end $$;
--> statement-breakpoint
create trigger release_is_signed before insert on releases for each row execute function check_release();
--> statement-breakpoint
revoke create on schema public from public;
--> statement-breakpoint
grant usage on schema public to ebbmark_web, ebbmark_worker, ebbmark_portal, ebbmark_verifier;
--> statement-breakpoint
grant select, insert, update, delete on users, accounts, sessions, verification_tokens, outbreaks, packages, measures, assessments, briefings, briefing_texts, subscriptions, deliveries, rate_limits to ebbmark_web;
--> statement-breakpoint
grant select, insert on frozen_assessments, briefing_versions, reviews, signature_voids, releases, publications, release_events to ebbmark_web;
--> statement-breakpoint
grant select on releases, publications, release_events, outbreaks to ebbmark_worker;
--> statement-breakpoint
grant select, update on subscriptions to ebbmark_worker;
--> statement-breakpoint
grant select, insert, update, delete on deliveries, rate_limits to ebbmark_worker;
--> statement-breakpoint
grant delete on verification_tokens, sessions to ebbmark_worker;
--> statement-breakpoint
grant select (expires, session_token) on sessions to ebbmark_worker;
--> statement-breakpoint
grant select (expires, identifier, token) on verification_tokens to ebbmark_worker;
--> statement-breakpoint
-- The public site can read publications and nothing else.
grant select on publications to ebbmark_portal;
--> statement-breakpoint
grant select (id, briefing_id, version_id, outbreak_id, slug, number, kind, correction, assessment_hash, content_hash, published_at) on releases to ebbmark_portal;
--> statement-breakpoint
grant select (id, release_id, kind, notice, by_release_id, at) on release_events to ebbmark_portal;
--> statement-breakpoint
grant select on frozen_assessments, briefing_versions, reviews, signature_voids, releases, publications, release_events to ebbmark_verifier;
