import { type Kysely, sql } from 'kysely';

/** Economies, their data, specifications and releases, what is published when, and the audit trail. */
// eslint-disable-next-line @typescript-eslint/no-explicit-any -- a migration is frozen in time: it knows no later table type
export async function up(db: Kysely<any>): Promise<void> {
  await sql`
    create table economy (
      code text primary key check (code ~ '^[A-Z]{3}$'),
      name text not null check (name <> ''),
      -- the name inside a sentence, with its article where it has one: "the Brannoch Isles"
      name_in_text text not null check (name_in_text <> ''),
      currency text not null check (currency <> ''),
      frequency text not null check (frequency in ('monthly', 'quarterly', 'annual')),
      contact text not null check (contact <> ''),
      created_at timestamptz not null,
      created_by text not null references person (id)
    );

    create table series (
      id text primary key check (id ~ '^[A-Z]{3}\\.[a-z_]+\\.[MQA]$'),
      economy_code text not null references economy (code),
      concept text not null check (concept in ('money', 'prices', 'activity')),
      title text not null,
      unit text not null,
      timing text check (timing in ('end', 'average')),
      adjustment text not null check (adjustment in ('adjusted', 'unadjusted')),
      source text not null,
      licence text not null,
      serve_values boolean not null,
      created_at timestamptz not null,
      unique (economy_code, concept)
    );

    create table vintage (
      id bigint generated always as identity primary key,
      economy_code text not null references economy (code),
      file_name text not null,
      file_hash text not null check (file_hash ~ '^[0-9a-f]{64}$'),
      file_size bigint not null check (file_size > 0),
      note text not null default '',
      source_published_at timestamptz not null,
      known_from timestamptz not null,
      public_from timestamptz,
      loaded_by text not null references person (id)
    );
    create index vintage_by_economy on vintage (economy_code, source_published_at);

    create table vintage_series (
      vintage_id bigint not null references vintage (id),
      series_id text not null references series (id),
      start text not null,
      "values" numeric[] not null check (cardinality("values") > 0),
      primary key (vintage_id, series_id)
    );

    create table specification (
      id bigint generated always as identity primary key,
      economy_code text not null references economy (code),
      version integer not null check (version > 0),
      assumptions jsonb not null,
      reason text not null check (reason <> ''),
      holds_from text not null,
      created_at timestamptz not null,
      created_by text not null references person (id),
      approved_at timestamptz,
      approved_by text references person (id),
      check (approved_by is distinct from created_by),
      unique (economy_code, version)
    );

    create table release (
      id text primary key,
      economy_code text not null references economy (code),
      period text not null,
      revision integer not null check (revision > 0),
      state text not null check (state in ('draft', 'in_review', 'approved', 'scheduled')),
      headline text not null default '',
      explainer text not null default '',
      vintage_id bigint not null references vintage (id),
      specification_id bigint not null references specification (id),
      -- json, not jsonb: the order of its fields is part of the published bytes
      request json,
      result json,
      computed_at timestamptz,
      method_version text,
      build text,
      -- raised by every change, so that two people never overwrite each other unseen
      version integer not null default 1,
      created_at timestamptz not null,
      created_by text not null references person (id),
      submitted_at timestamptz,
      submitted_by text references person (id),
      returned_reason text,
      approved_at timestamptz,
      approved_by text references person (id),
      scheduled_for timestamptz,
      scheduled_by text references person (id),
      -- set to scheduled_for in the transaction that readies its moment: before that nothing shows the release
      ready_for timestamptz,
      check (state <> 'scheduled' or (scheduled_for is not null and approved_by is not null)),
      unique (economy_code, period, revision)
    );
    create index release_by_time on release (ready_for) where state = 'scheduled';

    -- whoever touched data, specification or words of a revision may not approve it
    create table release_contributor (
      release_id text not null references release (id),
      person_id text not null references person (id),
      part text not null check (part in ('data', 'specification', 'words')),
      primary key (release_id, person_id, part)
    );

    create table release_value (
      release_id text not null references release (id),
      indicator text not null,
      period text not null,
      value double precision,
      lower double precision,
      upper double precision,
      primary key (release_id, indicator, period)
    );

    create table artefact (
      hash text primary key check (hash ~ '^[0-9a-f]{64}$'),
      media_type text not null,
      size bigint not null,
      created_at timestamptz not null
    );

    -- what is frozen at approval, under the name it has inside the release
    create table release_artefact (
      release_id text not null references release (id),
      name text not null,
      artefact_hash text not null references artefact (hash),
      primary key (release_id, name)
    );

    create table moment (
      visible_from timestamptz primary key,
      ready boolean not null default false,
      rendered_at timestamptz
    );

    create table published (
      address text not null check (address like '/%'),
      visible_from timestamptz not null references moment (visible_from) on delete cascade,
      artefact_hash text not null references artefact (hash),
      status smallint not null,
      headers jsonb not null,
      -- what was committed by then is in it
      drawn_at timestamptz not null,
      -- null for what is frozen; pages are drawn again for a new build or public address
      build text,
      generation bigint not null,
      primary key (address, visible_from)
    );
    create index published_by_time on published (visible_from);
    create index published_by_generation on published (generation);

    -- raised by every change of published, so that a process sees with one look whether it is behind
    create table publication (
      singleton boolean primary key default true check (singleton),
      generation bigint not null
    );
    insert into publication (generation) values (0);

    create table announcement (
      economy_code text not null references economy (code),
      period text not null,
      announced_at timestamptz not null,
      due_at timestamptz not null,
      reason text not null default '',
      announced_by text not null references person (id),
      primary key (economy_code, period, announced_at)
    );

    create table audit (
      id bigint generated always as identity primary key,
      at timestamptz not null,
      person_id text references person (id),
      role text not null,
      action text not null,
      subject text not null,
      detail jsonb not null,
      previous_hash text not null,
      hash text not null unique
    );
    create index audit_by_subject on audit (subject, id);

    -- a first seeding that was broken off is begun again from an empty database
    create table demo_seed (
      singleton boolean primary key default true check (singleton),
      started_at timestamptz not null,
      finished_at timestamptz
    );

    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception '% is written once and never changed', tg_table_name
        using errcode = 'restrict_violation';
    end $$;
    create trigger audit_is_final before update or delete or truncate on audit
      for each statement execute function refuse_change();
    create trigger release_value_is_final before update or truncate on release_value
      for each statement execute function refuse_change();
    create function refuse_change_of_scheduled() returns trigger language plpgsql as $$
    begin
      if exists (select from release where id = old.release_id and state = 'scheduled') then
        raise exception '% of a scheduled or published release never changes', tg_table_name
          using errcode = 'restrict_violation';
      end if;
      return old;
    end $$;
    create trigger release_value_stays before delete on release_value
      for each row execute function refuse_change_of_scheduled();
    create trigger release_artefact_stays before update or delete on release_artefact
      for each row execute function refuse_change_of_scheduled();
    create trigger vintage_series_is_final before update or delete or truncate on vintage_series
      for each statement execute function refuse_change();
  `.execute(db);
}
