import { randomBytes } from "node:crypto";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";

/** The installation's own secret, made once and kept beside its data, readable by its owner only. */
export function keptSecret(dataFolder: string): string {
  const path = join(dataFolder, "secret");
  mkdirSync(dataFolder, { recursive: true });
  try {
    writeFileSync(path, randomBytes(32).toString("base64url"), { flag: "wx", mode: 0o600 });
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== "EEXIST") throw error;
  }
  const secret = readFileSync(path, "utf8").trim();
  if (secret.length < 32) throw new Error(`The secret in ${path} has ${secret.length} characters and needs 32.`);
  return secret;
}
