import { describe, expect, it } from "vitest";
import { Durations } from "../../../server/services/cells/durations.ts";
import { type SystemSpecification, systemSpecification } from "../../../shared/schemas/system.ts";
import { SYSTEM_NAMES } from "../../../shared/systems/names.ts";

const WORK = { rows: 5000, goods: 6 };
const asked = (keys: Partial<SystemSpecification> & Record<string, unknown>): SystemSpecification =>
  systemSpecification.parse({ kind: "system", data: "survey", form: "aids", ...keys });
const about = (keys: Record<string, unknown>) => new Durations().about(asked(keys), WORK);

describe("how long an estimation takes", () => {
  it.each(SYSTEM_NAMES)("is told of every form: %s", (form) => {
    const milliseconds = about({ form });
    expect(milliseconds).toBeGreaterThanOrEqual(100);
    expect(milliseconds).toBeLessThan(600_000);
  });

  it("grows with the products that EASI has beside main effects", () => {
    const plain = { form: "easi", demographics: ["size", "urban", "age"] };
    const crossed = { ...plain, interactions: ["prices with demographics", "prices with expenditure"] };
    expect(about(crossed)).toBeGreaterThan(about(plain));
  });

  it("grows with terms of the season, where the rows are read in every iteration, and with replicates", () => {
    expect(about({ season: { period: 52 } })).toBeGreaterThan(2 * about({ trend: true }));
    expect(about({ form: "quaids" })).toBeGreaterThan(2 * about({}));
    const drawn = (replicates: number) => about({ "standard errors": { bootstrap: "rows", replicates } });
    expect(drawn(1000)).toBeGreaterThan(1.8 * drawn(500));
    expect(drawn(500)).toBeGreaterThan(10 * about({}));
  });

  it("learns from how long the last ones took, and not from how short ones warm up", () => {
    const durations = new Durations();
    const long = asked({ form: "quaids" });
    for (let time = 0; time < 5; time++) durations.learn(long, WORK, 30_000);
    expect(durations.about(long, WORK)).toBeGreaterThan(25_000);
    expect(durations.about(long, WORK)).toBeLessThan(31_000);
    for (let time = 0; time < 5; time++) durations.learn(asked({ form: "les" }), { rows: 30, goods: 3 }, 300);
    expect(durations.about(long, WORK)).toBeLessThan(40_000);
  });
});
