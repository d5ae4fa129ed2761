import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";

/** SHA-256 (FIPS 180-4) of a text's UTF-8 bytes, or of bytes, in lower-case hexadecimal. */
export function sha256Hex(content: string | Uint8Array): string {
  return bytesToHex(sha256(typeof content === "string" ? utf8ToBytes(content) : content));
}
