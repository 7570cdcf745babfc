import { apiKey } from '@better-auth/api-key';
import { betterAuth } from 'better-auth';
import { admin } from 'better-auth/plugins';
import { createAccessControl } from 'better-auth/plugins/access';
import type pg from 'pg';
import type { Env } from './env.ts';
import type { Mailer } from './mail.ts';
import type { Actor, Role } from './services/context.ts';

/** How long a password may be, in characters. */
export const PASSWORD_LENGTH = { min: 12, max: 128 };

/** The header that carries the client's address to the rate limit; set by `ask` alone, never taken from outside. */
const CLIENT_ADDRESS = 'x-slackwater-client-address';

/**
 * People are managed by our services, which check product.md's roles and write the audit trail in the same
 * transaction; the admin plugin keeps role and ban with a person, and its own roles may therefore do nothing.
 */
const access = createAccessControl({ person: ['manage'] } as const);
const powerless = access.newRole({ person: [] });
const roles = {
  subscriber: powerless,
  editor: powerless,
  reviewer: powerless,
  administrator: powerless,
} satisfies Record<Role, typeof powerless>;

export interface AuthParts {
  pool: pg.Pool;
  env: Pick<Env, 'publicUrl' | 'secret'>;
  mail: Mailer;
}

/**
 * Sign-in by e-mail and password, and the keys of the API. Its HTTP handler is asked by our own pages in process
 * (`ask`) and is mounted nowhere.
 */
export function createAuth({ pool, env, mail }: AuthParts) {
  return betterAuth({
    appName: 'Slackwater',
    baseURL: env.publicUrl,
    trustedOrigins: [env.publicUrl],
    secret: env.secret,
    database: pool,
    telemetry: { enabled: false },
    logger: { level: 'error' },
    emailAndPassword: {
      enabled: true,
      // Signing up is services/people/signUp.ts, so that the audit row stands in the same transaction.
      disableSignUp: true,
      requireEmailVerification: true,
      minPasswordLength: PASSWORD_LENGTH.min,
      maxPasswordLength: PASSWORD_LENGTH.max,
      revokeSessionsOnPasswordReset: true,
      resetPasswordTokenExpiresIn: 3600,
      sendResetPassword: ({ user, token }) =>
        mail.send({
          to: user.email,
          subject: 'Choose a new Slackwater password',
          text: `Open this address within one hour to choose a new password:\n\n${env.publicUrl}/sign-in/new-password/?token=${token}\n\nIf you did not ask for it, nothing has changed and you need do nothing.\n`,
        }),
    },
    emailVerification: {
      sendOnSignIn: true,
      expiresIn: 24 * 3600,
      sendVerificationEmail: ({ user, token }) =>
        mail.send({
          to: user.email,
          subject: 'Confirm your address for Slackwater',
          text: `Open this address within a day to confirm that it is yours:\n\n${env.publicUrl}/sign-up/confirm/?token=${token}\n\nIf you did not sign up, ignore this message.\n`,
        }),
    },
    session: {
      modelName: 'session',
      expiresIn: 7 * 24 * 3600,
      // Sessions are read in process, where a prolonged cookie could not be handed to the browser.
      disableSessionRefresh: true,
      fields: {
        expiresAt: 'expires_at',
        createdAt: 'created_at',
        updatedAt: 'updated_at',
        ipAddress: 'ip_address',
        userAgent: 'user_agent',
        userId: 'person_id',
      },
    },
    user: {
      modelName: 'person',
      fields: {
        emailVerified: 'email_verified',
        createdAt: 'created_at',
        updatedAt: 'updated_at',
      },
    },
    account: {
      fields: {
        accountId: 'account_id',
        providerId: 'provider_id',
        userId: 'person_id',
        accessToken: 'access_token',
        refreshToken: 'refresh_token',
        idToken: 'id_token',
        accessTokenExpiresAt: 'access_token_expires_at',
        refreshTokenExpiresAt: 'refresh_token_expires_at',
        createdAt: 'created_at',
        updatedAt: 'updated_at',
      },
    },
    verification: {
      fields: { expiresAt: 'expires_at', createdAt: 'created_at', updatedAt: 'updated_at' },
    },
    rateLimit: {
      enabled: true,
      customRules: {
        '/sign-in/email': { window: 60, max: 10 },
        '/request-password-reset': { window: 60, max: 5 },
        '/send-verification-email': { window: 60, max: 5 },
        '/reset-password': { window: 60, max: 10 },
      },
    },
    advanced: {
      cookiePrefix: 'slackwater',
      useSecureCookies: env.publicUrl.startsWith('https:'),
      defaultCookieAttributes: { httpOnly: true, sameSite: 'lax' },
      ipAddress: { ipAddressHeaders: [CLIENT_ADDRESS] },
    },
    plugins: [
      admin({
        defaultRole: 'subscriber',
        adminRoles: ['administrator'],
        roles,
        bannedUserMessage:
          'This account is closed. Write to the desk if you think that is a mistake.',
        schema: {
          user: { fields: { banReason: 'ban_reason', banExpires: 'ban_expires' } },
          session: { fields: { impersonatedBy: 'impersonated_by' } },
        },
      }),
      apiKey({
        defaultPrefix: 'slackwater_',
        requireName: true,
        maximumNameLength: 80,
        enableMetadata: true,
        startingCharactersConfig: { charactersLength: 'slackwater_'.length + 4 },
        // Limits are ours: the plugin's window would start again at each call.
        rateLimit: { enabled: false },
        schema: {
          apikey: {
            modelName: 'api_key',
            fields: {
              configId: 'config_id',
              referenceId: 'person_id',
              refillInterval: 'refill_interval',
              refillAmount: 'refill_amount',
              lastRefillAt: 'last_refill_at',
              rateLimitEnabled: 'rate_limit_enabled',
              rateLimitTimeWindow: 'rate_limit_time_window',
              rateLimitMax: 'rate_limit_max',
              requestCount: 'request_count',
              lastRequest: 'last_request',
              expiresAt: 'expires_at',
              createdAt: 'created_at',
              updatedAt: 'updated_at',
            },
          },
        },
      }),
    ],
  });
}

export type Auth = ReturnType<typeof createAuth>;

/** Who is signed in by these headers' cookie, or null: nobody, an ended session, or a closed account. */
export async function actorOf(
  auth: Auth,
  headers: Headers,
): Promise<(Actor & { id: string }) | null> {
  const session = await auth.api.getSession({ headers });
  if (!session) return null;
  const { id, name, role, banned, banExpires } = session.user;
  if (banned && !(banExpires && banExpires.getTime() < Date.now())) return null;
  return { id, name, role: role as Role };
}

/** What sign-in answered: cookies to set, and why not where it refused. */
export interface AuthAnswer {
  ok: boolean;
  status: number;
  /** A machine's word for the refusal, such as INVALID_EMAIL_OR_PASSWORD; empty when ok or unknown. */
  code: string;
  cookies: string[];
}

export interface Client {
  /** The address the request came from, for the rate limit. */
  address: string;
  headers: Headers;
}

/**
 * Asks better-auth's own handler in process, as our pages do, so that its rate limits and cookies apply.
 * `path` such as `/sign-in/email`.
 */
export async function ask(
  auth: Auth,
  client: Client,
  path: string,
  body: Record<string, unknown>,
): Promise<AuthAnswer> {
  const { baseURL, basePath } = { basePath: '/api/auth', ...auth.options };
  const headers = new Headers({
    'content-type': 'application/json',
    origin: new URL(baseURL).origin,
    [CLIENT_ADDRESS]: client.address,
  });
  for (const name of ['cookie', 'user-agent']) {
    const value = client.headers.get(name);
    if (value) headers.set(name, value);
  }
  const request = new Request(new URL(basePath + path, baseURL), {
    method: 'POST',
    headers,
    body: JSON.stringify(body),
  });
  const response = await auth.handler(request);
  const answer = (await response.json().catch(() => null)) as { code?: string } | null;
  return {
    ok: response.ok,
    status: response.status,
    code: response.ok ? '' : (answer?.code ?? ''),
    cookies: response.headers.getSetCookie(),
  };
}

/** Confirms an address by the token that was mailed to it; false where the token is wrong or too old. */
export async function confirmAddress(auth: Auth, token: string): Promise<boolean> {
  try {
    return (await auth.api.verifyEmail({ query: { token } }))?.status ?? false;
  } catch {
    return false;
  }
}
