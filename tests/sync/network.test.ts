import { describe, expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import { type Chance, MemoryStore, NetworkPage, textOf } from "../support/sync-network.ts";

const SEEDS = Number(process.env.SYNC_SEEDS ?? 60);
const STEPS = 400;

/** Weights of what may happen next. */
const EVENTS = {
  edit: 30,
  "to server": 30,
  "to page": 40,
  store: 12,
  cut: 2,
  connect: 8,
  crash: 1,
  fail: 1,
  forge: 3,
} as const;
type Event = keyof typeof EVENTS;

function draw(chance: Chance): Event {
  const all = Object.entries(EVENTS) as [Event, number][];
  let left = chance.uniform() * all.reduce((sum, [, weight]) => sum + weight, 0);
  for (const [event, weight] of all) {
    left -= weight;
    if (left < 0) return event;
  }
  return "store";
}

/** One history of a study on a bad network, all of it decided by the seed. */
async function history(seed: number) {
  const chance = seededRandom(seed);
  const store = new MemoryStore();
  let server = store.open();
  const pages = [0, 1, 2].map((number) => new NetworkPage(number, number === 0 ? "owner" : "coauthor", chance));
  const reader = new NetworkPage(3, "reader", chance);
  const everyone = [...pages, reader];
  const counts = new Map<Event, number>();

  const happen: Record<Event, (page: NetworkPage) => unknown> = {
    edit: (page) => page !== reader && page.edit(),
    "to server": (page) => page.deliverToServer(),
    // A document message may come twice.
    "to page": (page) => page.deliverToPage(chance.uniform() < 0.1 ? 2 : 1),
    store: () => server.room.idle(),
    cut: (page) => page.cut(),
    connect: (page) => page.connection ?? page.connect(server.room),
    crash: () => {
      server.kill();
      for (const page of everyone) page.cut();
      server = store.open();
    },
    fail: async () => {
      store.failing = true;
      await server.room.idle();
      store.failing = false;
    },
    forge: () => reader.forge(),
  };

  for (let step = 0; step < STEPS; step++) {
    const event = draw(chance);
    counts.set(event, (counts.get(event) ?? 0) + 1);
    await happen[event](everyone[chance.integer(everyone.length)]);
    const stored = store.text();
    for (const page of pages) expect(page.untrue(stored), `seed ${seed}, step ${step}, ${event}`).toEqual([]);
  }

  // The network heals.
  for (const page of everyone) if (page.connection === undefined) page.connect(server.room);
  for (let quiet = 0; quiet < 2; ) {
    const underway = everyone.some((page) => page.toServer.length > 0 || page.toPage.length > 0);
    for (const page of everyone) {
      page.deliverToServer();
      page.deliverToPage(1);
    }
    await server.room.idle();
    quiet = underway ? 0 : quiet + 1;
  }
  return { store, pages, reader, everyone, counts, source: server.room.sources()[0].source };
}

describe("on a network that loses, repeats and breaks", () => {
  it(`all replicas agree and nothing called stored is lost, over ${SEEDS} seeds`, async () => {
    const counts = new Map<Event, number>();
    let edits = 0;
    for (let seed = 1; seed <= SEEDS; seed++) {
      const end = await history(seed);
      const stored = end.store.text();
      expect(end.source, `seed ${seed}`).toBe(stored);
      for (const page of end.everyone) expect(textOf(page.doc).toString(), `seed ${seed}, ${page.id}`).toBe(stored);
      for (const page of end.pages) {
        expect(page.ledger.everythingStored, `seed ${seed}, ${page.id}`).toBe(true);
        expect(page.untrue(stored), `seed ${seed}`).toEqual([]);
        edits += page.made.length;
      }
      expect(stored).not.toContain("forged");
      for (const [event, count] of end.counts) counts.set(event, (counts.get(event) ?? 0) + count);
    }
    console.info(`${SEEDS} seeds, ${edits} edits, ${counts.get("crash")} crashes, ${counts.get("cut")} cuts`);
    for (const event of Object.keys(EVENTS)) expect(counts.get(event as Event), event).toBeGreaterThan(0);
  });
});
