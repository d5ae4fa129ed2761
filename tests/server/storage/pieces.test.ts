import { expect, test } from "vitest";
import { inPieces } from "../../../server/storage/pieces.ts";
import { seededRandom } from "../../../shared/numerics/random.ts";

async function piecesOf(parts: Uint8Array[], size: number): Promise<Buffer[]> {
  async function* source() {
    yield* parts;
  }
  const pieces: Buffer[] = [];
  for await (const piece of inPieces(source(), size)) pieces.push(piece);
  return pieces;
}

test("pieces are full but for the last, and together what came, however it came", async () => {
  const random = seededRandom(7);
  for (let round = 0; round < 50; round += 1) {
    const parts = Array.from({ length: random.integer(12) }, () =>
      Uint8Array.from({ length: random.integer(40) }, () => random.integer(256)),
    );
    const whole = Buffer.concat(parts);
    const size = 1 + random.integer(25);
    const pieces = await piecesOf(parts, size);
    expect(Buffer.concat(pieces).equals(whole)).toBe(true);
    expect(pieces).toHaveLength(Math.ceil(whole.length / size));
    expect(pieces.slice(0, -1).every((piece) => piece.length === size)).toBe(true);
  }
});
