import { Room, type RoomNeeds } from "./room.ts";

/** The rooms in memory: loaded when first asked for, unloaded some time after the last person has left. */
export class Rooms {
  readonly #rooms = new Map<string, Room>();
  readonly #timers = new Map<Room, ReturnType<typeof setTimeout>>();
  readonly #needs: RoomNeeds;

  constructor(needs: Omit<RoomNeeds, "empty">) {
    this.#needs = { ...needs, empty: (room) => this.#unloadLater(room) };
  }

  /** The study's room; throws when its document cannot be read. */
  open(studyId: string): Room {
    const known = this.#rooms.get(studyId);
    if (known !== undefined) return known;
    const room = new Room(studyId, this.#needs);
    this.#rooms.set(studyId, room);
    this.#unloadLater(room);
    this.#needs.opened?.(studyId);
    return room;
  }

  loaded(studyId: string): Room | undefined {
    return this.#rooms.get(studyId);
  }

  all(): Room[] {
    return [...this.#rooms.values()];
  }

  async close(): Promise<void> {
    for (const timer of this.#timers.values()) clearTimeout(timer);
    this.#timers.clear();
    await Promise.all(this.all().map((room) => room.idle()));
    for (const room of this.all()) room.unload();
    this.#rooms.clear();
  }

  #unloadLater(room: Room): void {
    clearTimeout(this.#timers.get(room));
    const timer = setTimeout(() => void this.#unload(room), this.#needs.limits.unloadAfterMs);
    timer.unref();
    this.#timers.set(room, timer);
  }

  async #unload(room: Room): Promise<void> {
    this.#timers.delete(room);
    await room.idle();
    // Someone may have come back; then the last to leave sets the time anew.
    if (room.connections.size > 0 || this.#timers.has(room) || this.#rooms.get(room.studyId) !== room) return;
    this.#rooms.delete(room.studyId);
    room.unload();
  }
}
