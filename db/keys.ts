/** What the keys of a plan may be used for: calls a minute, and calls a month, of UTC. */
export interface PlanTable {
  name: string;
  per_minute: number;
  per_month: number;
}

/** Calls of a key in one minute or month. */
export interface KeyUsageTable {
  key_id: string;
  span: 'minute' | 'month';
  starts_at: Date;
  calls: number;
}

/** Tables of the API's limits; the keys themselves are sign-in's. */
export interface KeyTables {
  plan: PlanTable;
  key_usage: KeyUsageTable;
}
