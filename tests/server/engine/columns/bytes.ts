/** The bytes of a text, in pieces of so many bytes, as an upload arrives. */
export async function* bytesOf(content: string | Uint8Array, piece = 7): AsyncGenerator<Uint8Array> {
  const bytes = typeof content === "string" ? new TextEncoder().encode(content) : content;
  for (let from = 0; from < bytes.length; from += piece) yield bytes.subarray(from, from + piece);
}
