export { runData } from "./data.ts";
export { runSlutsky } from "./slutsky.ts";
export { runSystem } from "./system.ts";
export { runTests } from "./tests.ts";
