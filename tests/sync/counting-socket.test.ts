import { describe, expect, it } from "vitest";
import { answerWith, askFor, presenceOf, updateOf } from "../../server/sync/messages.ts";
import { countingSocket } from "../../src/sync/counting-socket.ts";

/** A WebSocket without a wire. */
class Wire {
  readonly sent: Uint8Array[] = [];
  send(data: Uint8Array): void {
    this.sent.push(data);
  }
}

function open(readOnly = false) {
  const calls: string[] = [];
  const Counting = countingSocket(Wire as unknown as typeof WebSocket, {
    connecting: () => calls.push("connecting"),
    wrote: () => calls.push("wrote"),
    readOnly: () => readOnly,
    presenceId: () => 7,
  });
  const socket = new Counting("ws://tangency.example/sync/study");
  return { socket, calls, sent: (socket as unknown as Wire).sent };
}

const empty = new Uint8Array([0, 0]);
const update = updateOf(empty);
const answer = answerWith(empty);
const ask = askFor(new Uint8Array([0]));
const presence = (...ids: number[]) =>
  presenceOf(new Uint8Array([ids.length, ...ids.flatMap((id) => [id, 1, 2, 123, 125])]));

describe("the counting socket", () => {
  it("holds updates back until the server's question is answered, since the answer holds them", () => {
    const { socket, calls, sent } = open();
    for (const message of [ask, update, answer, update]) socket.send(message as Uint8Array<ArrayBuffer>);
    expect(sent).toEqual([ask, answer, update]);
    expect(calls).toEqual(["connecting", "wrote", "wrote"]);
  });

  it("sends a page's own presence and no echo of others'", () => {
    const { socket, sent } = open();
    for (const message of [presence(3), presence(7), presence(3, 7)]) socket.send(message as Uint8Array<ArrayBuffer>);
    expect(sent).toEqual([presence(7), presence(3, 7)]);
  });

  it("lets a reader ask, and nothing else", () => {
    const { socket, calls, sent } = open(true);
    for (const message of [ask, answer, update, presence(7)]) socket.send(message as Uint8Array<ArrayBuffer>);
    expect(sent).toEqual([ask]);
    expect(calls).toEqual(["connecting"]);
  });
});
