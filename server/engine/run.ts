import type { Progress } from "../../shared/schemas/status.ts";

/** How a long computation speaks while it runs, and how it is told to stop. */
export interface RunControl {
  progress(now: Omit<Progress, "elapsedMs" | "aboutMs">): void;
  /** True once someone has cancelled: the computation throws `Cancelled` at its next opportunity. */
  cancelled(): boolean;
  /** Threads among which the work may be divided; absent where one computes alone. Numbers do not depend on it. */
  readonly threads?: Threads;
}

/** An exported function that any thread can find and run; made by `task` of threads/map-in-order.ts. */
export interface Task<Shared, Item, Result> {
  /** The `import.meta.url` of its module. */
  readonly module: string;
  /** Under which that module exports it. */
  readonly name: string;
  run(shared: Shared, item: Item, control: RunControl): Result;
}

/** The threads of one computation: the one that computes and those that help it. */
export interface Threads {
  /** All of them. */
  readonly count: number;
  /** Multiplications below which dividing a computation costs more than it saves: some fifty milliseconds. */
  readonly worthDividing: number;
  /** What `mapInOrder` of threads/map-in-order.ts does where there are several. */
  map<Shared, Item, Result>(
    task: Task<Shared, Item, Result>,
    shared: Shared,
    items: readonly Item[],
    control: RunControl,
    onDone: (done: number) => void,
  ): Result[];
}

/** Thrown by the engine when `cancelled()` turned true. */
export class Cancelled extends Error {
  override name = "Cancelled";
}

export const QUIET: RunControl = { progress() {}, cancelled: () => false };

/** Throws `Cancelled` once someone has cancelled: for loops that may take seconds. */
export type Poll = () => void;

export function polling(control: RunControl, doing: string): Poll {
  return () => {
    if (control.cancelled()) throw new Cancelled(`cancelled while ${doing}`);
  };
}
