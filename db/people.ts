import type { Generated, Selectable } from 'kysely';

/** Someone with an account. */
export interface PersonTable {
  id: string;
  name: string;
  email: string;
  email_verified: boolean;
  image: string | null;
  created_at: Generated<Date>;
  updated_at: Generated<Date>;
  role: Generated<'subscriber' | 'editor' | 'reviewer' | 'administrator'>;
  banned: Generated<boolean | null>;
  ban_reason: string | null;
  ban_expires: Date | null;
}

export interface SessionTable {
  id: string;
  expires_at: Date;
  token: string;
  created_at: Generated<Date>;
  updated_at: Date;
  ip_address: string | null;
  user_agent: string | null;
  person_id: string;
  impersonated_by: string | null;
}

/** How a person signs in; `password` is a hash. */
export interface AccountTable {
  id: string;
  account_id: string;
  provider_id: string;
  person_id: string;
  access_token: string | null;
  refresh_token: string | null;
  id_token: string | null;
  access_token_expires_at: Date | null;
  refresh_token_expires_at: Date | null;
  scope: string | null;
  password: string | null;
  created_at: Generated<Date>;
  updated_at: Date;
}

export interface VerificationTable {
  id: string;
  identifier: string;
  value: string;
  expires_at: Date;
  created_at: Generated<Date>;
  updated_at: Generated<Date>;
}

/** A key to the API; `key` is its hash, `start` the first characters shown to tell keys apart. */
export interface ApiKeyTable {
  id: string;
  config_id: string;
  name: string | null;
  start: string | null;
  person_id: string;
  prefix: string | null;
  key: string;
  refill_interval: number | null;
  refill_amount: number | null;
  last_refill_at: Date | null;
  enabled: boolean | null;
  rate_limit_enabled: boolean | null;
  rate_limit_time_window: number | null;
  rate_limit_max: number | null;
  request_count: number | null;
  remaining: number | null;
  last_request: Date | null;
  expires_at: Date | null;
  created_at: Date;
  updated_at: Date;
  permissions: string | null;
  metadata: string | null;
  plan: Generated<string>;
}

/** Tables of sign-in, roles and API keys. */
export interface PeopleTables {
  person: PersonTable;
  session: SessionTable;
  account: AccountTable;
  verification: VerificationTable;
  api_key: ApiKeyTable;
}

export type Person = Selectable<PersonTable>;
