export * from "./auth.ts";
export * from "./documents.ts";
export * from "./estimations.ts";
export * from "./findings.ts";
export * from "./history.ts";
export * from "./referee-copies.ts";
export * from "./studies.ts";
export * from "./uploads.ts";
