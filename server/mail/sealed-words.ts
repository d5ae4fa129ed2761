import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from "node:crypto";

const NONCE = 12;
const TAG = 16;

/**
 * Seals the words of messages that wait in the database: links stand in them, and the database alone must not open
 * one. AES-256-GCM under a key derived from the installation's secret.
 */
export function sealedWords(secret: string) {
  const key = Buffer.from(hkdfSync("sha256", secret, "", "tangency mail", 32));
  return {
    seal(words: string): string {
      const nonce = randomBytes(NONCE);
      const cipher = createCipheriv("aes-256-gcm", key, nonce);
      const sealed = Buffer.concat([cipher.update(words, "utf8"), cipher.final()]);
      return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString("base64");
    },

    /** Undefined when they were sealed under another secret. */
    open(sealed: string): string | undefined {
      const bytes = Buffer.from(sealed, "base64");
      try {
        const decipher = createDecipheriv("aes-256-gcm", key, bytes.subarray(0, NONCE));
        decipher.setAuthTag(bytes.subarray(NONCE, NONCE + TAG));
        return Buffer.concat([decipher.update(bytes.subarray(NONCE + TAG)), decipher.final()]).toString("utf8");
      } catch {
        return undefined;
      }
    },
  };
}
