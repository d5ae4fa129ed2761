import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import type { QuestionKind, Questions, Reply, Request } from "./protocol.ts";
import { tryPrices } from "./try-prices.ts";
import { verifyCopy } from "./verify-copy.ts";

type Answers = { [K in QuestionKind]: (ask: Questions[K]["ask"]) => Questions[K]["answer"] };

const ANSWERS: Answers = {
  matrix: ({ fitted, point, ...options }) => matrixAt(fitted, point, options),
  elasticities: ({ fitted, point }) => elasticitiesAt(fitted, point),
  prices: tryPrices,
  verification: (copy) => verifyCopy(copy, () => performance.now()),
};

function answerOf<K extends QuestionKind>({ kind, ask }: Request<K>): Questions[K]["answer"] {
  return ANSWERS[kind](ask);
}

/** The reply to a request; what cannot be computed is refused with its reason. */
export function replyTo(request: Request): Reply {
  try {
    return { id: request.id, answer: answerOf(request) };
  } catch (error) {
    return { id: request.id, refusal: error instanceof Error ? error.message : String(error) };
  }
}
