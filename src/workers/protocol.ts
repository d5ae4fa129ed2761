import type { Elasticities } from "../../shared/economics/elasticities.ts";
import type { PriceAnswer } from "../../shared/economics/price-change/answer-at.ts";
import type { PriceChangeFinding, PriceQuestion } from "../../shared/schemas/price-change.ts";
import type { RefereeCopy } from "../../shared/schemas/referee-copy.ts";
import type { MatrixAtPoint } from "../../shared/schemas/slutsky.ts";
import type { FittedSystem } from "../../shared/schemas/system.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import type { Verification } from "./verify-copy.ts";

/** A fitted system and a point of a finding, with another question put to them. */
export interface PricesAsked
  extends Pick<
    PriceChangeFinding,
    "fitted" | "point" | "pointName" | "priceScale" | "totalScale" | "level" | "priceRange"
  > {
  readonly question: PriceQuestion;
}

/** What the worker can be asked, and what each question is answered with. */
export interface Questions {
  matrix: {
    ask: {
      readonly fitted: FittedSystem;
      readonly point: Point;
      readonly priceScale: readonly number[];
      readonly totalScale: number;
      readonly pointName: string;
    };
    answer: MatrixAtPoint;
  };
  elasticities: { ask: { readonly fitted: FittedSystem; readonly point: Point }; answer: Elasticities };
  prices: { ask: PricesAsked; answer: PriceAnswer };
  verification: { ask: RefereeCopy; answer: Verification };
}
export type QuestionKind = keyof Questions;

export interface Request<K extends QuestionKind = QuestionKind> {
  readonly id: number;
  readonly kind: K;
  readonly ask: Questions[K]["ask"];
}

export type Reply =
  | { readonly id: number; readonly answer: Questions[QuestionKind]["answer"] }
  | { readonly id: number; readonly refusal: string };
