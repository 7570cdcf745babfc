import { type Kysely, sql } from 'kysely';

/** Plans of the API with their limits, which plan a key has, and what it has used. */
// eslint-disable-next-line @typescript-eslint/no-explicit-any -- a migration is frozen in time: it knows no later table type
export async function up(db: Kysely<any>): Promise<void> {
  await sql`
    create table plan (
      name text primary key check (name <> ''),
      per_minute integer not null check (per_minute > 0),
      per_month integer not null check (per_month > 0)
    );
    insert into plan (name, per_minute, per_month)
      values ('open', 60, 20000), ('desk', 600, 500000);

    -- the default is what the key plugin's own insert gets, which knows no plans
    alter table api_key add column plan text not null default 'open' references plan (name);

    -- calls of a minute or month of UTC; every process adds its own each second
    create table key_usage (
      key_id text not null references api_key (id) on delete cascade,
      span text not null check (span in ('minute', 'month')),
      starts_at timestamptz not null,
      calls integer not null check (calls >= 0),
      primary key (key_id, span, starts_at)
    );
    create index key_usage_by_time on key_usage (span, starts_at);
  `.execute(db);
}
