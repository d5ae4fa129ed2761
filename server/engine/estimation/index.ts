export { accumulateMoments } from "./accumulate.ts";
export { estimateSystem } from "./estimate.ts";
export type { Moments } from "./moments.ts";
export { refitMoments } from "./refit-moments.ts";
export { type MomentsRequest, momentsRequest } from "./request.ts";
export { requireRows } from "./require-rows.ts";
