import { type Kysely, sql } from 'kysely';

/**
 * People, their sign-in and their API keys: the tables of better-auth 1.7.7 and its API-key plugin 1.7.5 as they
 * compile them, in our names and with our checks. An upgrade that changes them comes as a new migration.
 */
// eslint-disable-next-line @typescript-eslint/no-explicit-any -- a migration is frozen in time: it knows no later table type
export async function up(db: Kysely<any>): Promise<void> {
  await sql`
    create table person (
      id text primary key,
      name text not null check (name <> ''),
      email text not null unique check (email = lower(email)),
      email_verified boolean not null,
      image text,
      created_at timestamptz not null default current_timestamp,
      updated_at timestamptz not null default current_timestamp,
      role text not null default 'subscriber'
        check (role in ('subscriber', 'editor', 'reviewer', 'administrator')),
      banned boolean default false,
      ban_reason text,
      ban_expires timestamptz
    );

    create table session (
      id text primary key,
      expires_at timestamptz not null,
      token text not null unique,
      created_at timestamptz not null default current_timestamp,
      updated_at timestamptz not null,
      ip_address text,
      user_agent text,
      person_id text not null references person (id) on delete cascade,
      impersonated_by text
    );
    create index session_by_person on session (person_id);

    -- how a person signs in: the password's hash is here, not with the person
    create table account (
      id text primary key,
      account_id text not null,
      provider_id text not null,
      person_id text not null references person (id) on delete cascade,
      access_token text,
      refresh_token text,
      id_token text,
      access_token_expires_at timestamptz,
      refresh_token_expires_at timestamptz,
      scope text,
      password text,
      created_at timestamptz not null default current_timestamp,
      updated_at timestamptz not null
    );
    create index account_by_person on account (person_id);

    create table verification (
      id text primary key,
      identifier text not null,
      value text not null,
      expires_at timestamptz not null,
      created_at timestamptz not null default current_timestamp,
      updated_at timestamptz not null default current_timestamp
    );
    create index verification_by_identifier on verification (identifier);

    create table api_key (
      id text primary key,
      config_id text not null,
      name text,
      start text,
      person_id text not null references person (id) on delete cascade,
      prefix text,
      -- the hash of the key; its plain text is shown once and kept nowhere
      key text not null unique,
      refill_interval integer,
      refill_amount integer,
      last_refill_at timestamptz,
      enabled boolean,
      rate_limit_enabled boolean,
      rate_limit_time_window integer,
      rate_limit_max integer,
      request_count integer,
      remaining integer,
      last_request timestamptz,
      expires_at timestamptz,
      created_at timestamptz not null,
      updated_at timestamptz not null,
      permissions text,
      metadata text
    );
    create index api_key_by_config on api_key (config_id);
    create index api_key_by_person on api_key (person_id);
  `.execute(db);
}
