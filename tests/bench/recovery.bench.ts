import { coverageOf, RECOVERED, recover } from "../support/recovery.ts";
import { say } from "./timing.ts";

/** 200 samples a system: how often 95 % intervals cover, beside the Monte Carlo error of 0.95 itself. */
const SAMPLES = 200;

for (const form of RECOVERED) {
  const coverage = coverageOf(SAMPLES, (sample) => recover(form, "conventional", 400, sample + 1));
  say({ figure: "recovery", form, errors: "conventional", reference: 0.95, ...coverage });
}
for (const errors of ["conventional in villages", "clustered", "bootstrap"] as const) {
  const coverage = coverageOf(SAMPLES, (sample) => recover("aids", errors, 1200, sample + 1));
  say({ figure: "recovery", form: "aids", errors, reference: 0.95, ...coverage });
}
