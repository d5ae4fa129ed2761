import { betterAuth } from "better-auth";
import { drizzleAdapter } from "better-auth/adapters/drizzle";
import { LONGEST_PASSPHRASE, SHORTEST_PASSPHRASE } from "../../shared/schemas/accounts.ts";
import type { Database } from "../db/client.ts";
import { findAccountByEmail } from "../db/queries/accounts.ts";
import * as schema from "../db/schema/auth.ts";
import type { AccountEvents } from "./account-events.ts";

interface Settings {
  readonly db: Database;
  readonly url: string;
  readonly trustedOrigins: readonly string[];
  /** Cookies only over TLS. */
  readonly secure: boolean;
  readonly secret: string;
  readonly events: Pick<AccountEvents, "resetAsked" | "passphraseReset">;
  /** Told of every session that ends before its time, by whatever it was ended. */
  readonly sessionEnded: (sessionId: string) => void;
}

const HOUR = 3600;

/** Accounts, passphrases (scrypt, which is hard in memory) and sessions, by the package that keeps them. */
export function createAuthentication({ db, url, trustedOrigins, secure, secret, ...told }: Settings) {
  return betterAuth({
    appName: "Tangency",
    baseURL: url,
    basePath: "/api/auth",
    secret,
    trustedOrigins: [...trustedOrigins],
    database: drizzleAdapter(db, { provider: "sqlite", schema }),
    emailAndPassword: {
      enabled: true,
      // Accounts are made by `services/accounts.ts`, once their address is known to be theirs.
      disableSignUp: true,
      resetPasswordTokenExpiresIn: HOUR,
      revokeSessionsOnPasswordReset: true,
      sendResetPassword: async ({ user, token }) => told.events.resetAsked(user, token),
      onPasswordReset: async ({ user }) => told.events.passphraseReset(user),
      minPasswordLength: SHORTEST_PASSPHRASE,
      maxPasswordLength: LONGEST_PASSPHRASE,
    },
    // Of a link that was sent, its hash is kept.
    verification: { storeIdentifier: "hashed" },
    session: { expiresIn: 30 * 24 * HOUR, updateAge: 24 * HOUR },
    databaseHooks: { session: { delete: { after: async ({ id }) => told.sessionEnded(id) } } },
    // The routes count requests themselves, by address and by account.
    rateLimit: { enabled: false },
    // It would write e-mail addresses into the log.
    logger: { disabled: true },
    telemetry: { enabled: false },
    advanced: {
      cookiePrefix: "tangency",
      useSecureCookies: secure,
      // Said outright, or the check is off wherever tests run and they would prove nothing.
      disableOriginCheck: false,
      ipAddress: { ipAddressHeaders: ["x-client-ip"] },
      defaultCookieAttributes: { httpOnly: true, sameSite: "lax" },
    },
  });
}

export type Authentication = ReturnType<typeof createAuthentication>;

/** Makes the account unless there is one with the address; gives it the passphrase if it has none. Returns its id. */
export async function ensureAccount(
  auth: Authentication,
  db: Database,
  wanted: { readonly name: string; readonly email: string; readonly passphrase: string },
): Promise<string> {
  const { internalAdapter, password } = await auth.$context;
  const existing = findAccountByEmail(db, wanted.email);
  const { id } =
    existing ??
    (await internalAdapter.createUser(
      { name: wanted.name, email: wanted.email, emailVerified: true },
      { method: "email-password" },
    ));
  const credentials = await internalAdapter.findAccounts(id);
  if (!credentials.some((credential) => credential.providerId === "credential")) {
    await internalAdapter.linkAccount({
      userId: id,
      providerId: "credential",
      accountId: id,
      password: await password.hash(wanted.passphrase),
    });
  }
  return id;
}
