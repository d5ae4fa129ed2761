import * as decoding from "lib0/decoding";
import { type Awareness, applyAwarenessUpdate, modifyAwarenessUpdate } from "y-protocols/awareness";
import { WebsocketProvider } from "y-websocket";
import type * as Y from "yjs";
import { studyStatus } from "../../shared/schemas/status.ts";
import { CLOSE, MESSAGE, peoplePresent } from "../../shared/schemas/sync.ts";
import { countingSocket } from "./counting-socket.ts";
import type { EditLedger } from "./edit-ledger.ts";
import { withColours } from "./people.ts";
import { isRefusal, sentenceFor } from "./refusals.ts";
import type { Observed, StudySnapshot } from "./snapshot.ts";

export interface LineNeeds {
  readonly studyId: string;
  readonly doc: Y.Doc;
  readonly awareness: Awareness;
  readonly ledger: EditLedger;
  readonly snapshot: Observed<StudySnapshot>;
  /** An acknowledgement has come. */
  acknowledged(): void;
  readonly now: () => number;
  /** Address of the sockets, without the study; that of the page when left out. */
  readonly server?: string;
  readonly WebSocket?: typeof WebSocket;
}

/** The wire to the server: what comes over it is put into the snapshot. Opened by `connect`. */
export function openLine(needs: LineNeeds): WebsocketProvider {
  const { snapshot, ledger, awareness } = needs;
  let hasSynced = false;
  const provider = new WebsocketProvider(needs.server ?? addressOfPage(), needs.studyId, needs.doc, {
    connect: false,
    // Two windows of one browser would pass the server by.
    disableBc: true,
    awareness,
    shouldReconnect: ({ code }) => {
      // A session renewed, or signed out in another window only, closes with 4401 too: worth one more question.
      const askAgain = hasSynced && code === CLOSE.notSignedIn;
      hasSynced = false;
      return askAgain || !isRefusal(code);
    },
    WebSocketPolyfill: countingSocket(needs.WebSocket ?? WebSocket, {
      connecting: () => ledger.connecting(),
      wrote: () => ledger.wrote(),
      readOnly: () => snapshot.get().readOnly,
      presenceId: () => awareness.clientID,
    }),
  });
  provider.on("sync", (synced) => {
    if (!synced) return;
    hasSynced = true;
    snapshot.set({ connection: { state: "connected" }, loaded: true });
  });
  provider.on("connection-close", () => {
    const { connection, you } = snapshot.get();
    if (connection.state === "working alone") return;
    snapshot.set({
      connection: { state: "working alone", since: needs.now(), editsKept: ledger.unstored },
      people: you === undefined ? [] : [you],
    });
  });
  provider.on("closed", ({ code }) => {
    snapshot.set({ connection: { state: "refused", code, sentence: sentenceFor(code) } });
  });
  listen(provider, needs);
  return provider;
}

function listen(provider: WebsocketProvider, { snapshot, ledger, awareness, acknowledged }: LineNeeds): void {
  const on = (type: number, read: (decoder: decoding.Decoder) => void) => {
    provider.messageHandlers[type] = (_encoder, decoder) => read(decoder);
  };
  on(MESSAGE.presence, (decoder) => {
    const { you } = snapshot.get();
    const entries = modifyAwarenessUpdate(decoding.readVarUint8Array(decoder), (state) => withColours(state, you));
    applyAwarenessUpdate(awareness, entries, provider);
  });
  on(MESSAGE.stored, (decoder) => {
    ledger.acknowledged(decoding.readVarUint(decoder));
    acknowledged();
  });
  on(MESSAGE.status, (decoder) => {
    const status = studyStatus.safeParse(readJson(decoder));
    if (status.success) snapshot.set({ status: status.data });
  });
  on(MESSAGE.remarks, () => snapshot.set({ remarksTold: snapshot.get().remarksTold + 1 }));
  on(MESSAGE.people, (decoder) => {
    const present = peoplePresent.safeParse(readJson(decoder));
    if (!present.success) return;
    const { you, people } = present.data;
    snapshot.set({ you, people, readOnly: you.role === "reader" });
    // A reader has no presence; someone who has just become a coauthor begins to have one.
    if (you.role !== "reader" && awareness.getLocalState() === null) awareness.setLocalState({});
  });
}

function readJson(decoder: decoding.Decoder): unknown {
  return JSON.parse(decoding.readVarString(decoder));
}

function addressOfPage(): string {
  const { protocol, host } = window.location;
  return `${protocol === "https:" ? "wss" : "ws"}://${host}/sync`;
}
