import { createHash, randomBytes } from "node:crypto";

/** A link's secret part: told once to whoever is sent it. What is kept is its hash. */
export function newLinkToken(): { readonly token: string; readonly tokenHash: string } {
  const token = randomBytes(32).toString("base64url");
  return { token, tokenHash: linkTokenHash(token) };
}

export function linkTokenHash(token: string): string {
  return createHash("sha256").update(token).digest("hex");
}
