import { useSyncExternalStore } from "react";
import type { PriceAnswer } from "../../../shared/economics/price-change/answer-at.ts";
import type { PriceChangeFinding, PriceQuestion } from "../../../shared/schemas/price-change.ts";
import { createEconomicsWorker, type EconomicsWorker } from "../../workers/client.ts";
import { editsTo } from "./rates.ts";

/** Other prices put to a finding's system: what the rulers say, and what was last answered. */
export interface TrialState {
  readonly question: PriceQuestion;
  /** Whether the rulers stand anywhere else than the stored question. */
  readonly isTried: boolean;
  /** The finding as stored, or with the last answer in its place. */
  readonly shown: PriceChangeFinding;
  /** Why there is no answer to what is tried, as a clause. */
  readonly refusal?: string;
  /** How long the last answer took. */
  readonly tookMs?: number;
}

export interface Trial {
  readonly state: () => TrialState;
  readonly subscribe: (listener: () => void) => () => void;
  readonly ask: (question: PriceQuestion) => void;
}

const NOT_COUNTED = "These prices are tried out in the browser and not stored, and the rows are with the server.";

/** A finding with what was tried in the place of what is stored. Nothing in it speaks of the rows, which are not here. */
function triedFinding(finding: PriceChangeFinding, question: PriceQuestion, tried: PriceAnswer): PriceChangeFinding {
  const { incidence: _, ...rest } = finding;
  return { ...rest, ...tried, question, intervals: "normal", noIncidence: NOT_COUNTED };
}

/**
 * One question at a time is with the worker and at most one waits, the latest: what lies between was never seen. The
 * worker is started by the first question and ends with the last who looks.
 */
export function createTrial(finding: PriceChangeFinding, start: () => EconomicsWorker = createEconomicsWorker): Trial {
  const listeners = new Set<() => void>();
  const stored: TrialState = { question: finding.question, isTried: false, shown: finding };
  let state = stored;
  let worker: EconomicsWorker | undefined;
  let asked: PriceQuestion | undefined;
  let isBusy = false;

  const show = (next: TrialState) => {
    state = next;
    for (const listener of listeners) listener();
  };
  const settle = (question: PriceQuestion, answer: Partial<TrialState>) => {
    isBusy = false;
    if (state.isTried) show({ ...state, refusal: undefined, ...answer });
    if (state.isTried && asked !== question) next();
  };
  const next = () => {
    if (isBusy || asked === undefined) return;
    const question = asked;
    const { fitted, point, pointName, priceScale, totalScale, level, priceRange } = finding;
    isBusy = true;
    worker ??= start();
    const own = worker;
    const begun = performance.now();
    own.ask("prices", { fitted, point, pointName, priceScale, totalScale, level, priceRange, question }).then(
      (tried) => settle(question, { shown: triedFinding(finding, question, tried), tookMs: performance.now() - begun }),
      (error) => {
        if (own === worker) settle(question, { refusal: error instanceof Error ? error.message : String(error) });
      },
    );
  };
  return {
    state: () => state,
    subscribe: (listener) => {
      listeners.add(listener);
      return () => {
        listeners.delete(listener);
        if (listeners.size > 0) return;
        worker?.close();
        worker = undefined;
        isBusy = false;
      };
    },
    ask: (question) => {
      const isTried = editsTo(finding.question, question).length > 0;
      asked = isTried ? question : undefined;
      show(isTried ? { ...state, question, isTried } : { ...stored });
      next();
    },
  };
}

const TRIALS = new WeakMap<PriceChangeFinding, Trial>();

/** The trial of a finding, one for the rulers on the left page and the figures on the right. */
export function trialOf(finding: PriceChangeFinding): Trial {
  const known = TRIALS.get(finding) ?? createTrial(finding);
  TRIALS.set(finding, known);
  return known;
}

export function useTrial(finding: PriceChangeFinding): TrialState & Pick<Trial, "ask"> {
  const { ask, subscribe, state } = trialOf(finding);
  return { ...useSyncExternalStore(subscribe, state), ask };
}
