export { runData } from "./data.ts";
export { runElasticities } from "./elasticities.ts";
export { runFigure } from "./figure.ts";
export { runPriceChange } from "./price-change.ts";
export { runSlutsky } from "./slutsky.ts";
export { runSystem } from "./system.ts";
export { runTests } from "./tests.ts";
export { runText } from "./text.ts";
