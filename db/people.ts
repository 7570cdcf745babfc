/** Tables of sign-in, roles and API keys. */
export type PeopleTables = Record<never, never>;
