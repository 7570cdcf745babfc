/** What a key may be used for. */
export const SCOPES = ['read', 'scenarios'] as const;
export type Scope = (typeof SCOPES)[number];

/** Each scope in words, for the page where keys are made. */
export const SCOPE_WORDS: Record<Scope, string> = {
  read: 'Read everything published',
  scenarios: 'Compute scenarios',
};

/** The form in which the key plugin keeps permissions. */
export function permissionsOf(scopes: Scope[]): string {
  return JSON.stringify({ api: scopes });
}

/** Scopes of a kept permission text; unknown ones count for nothing. */
export function scopesOf(permissions: string | null): Scope[] {
  if (!permissions) return [];
  const { api } = JSON.parse(permissions) as { api?: string[] };
  return SCOPES.filter((scope) => api?.includes(scope));
}
