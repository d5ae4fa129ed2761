import { describe, expect, it } from "vitest";
import { coverages, coversAsItSays, NOMINAL } from "../support/coverage.ts";
import { coefficientIntervals, drawSample, estimateOf, type RecoveredSystem } from "../support/recovery.ts";

/**
 * Rows of a cluster share prices and a part of their errors. Sandwiches rest on many clusters: where they are few,
 * coverage is below nominal whatever the number of rows, since each cluster's scores are those of residuals that the
 * estimates have made smaller (Cameron, Gelbach & Miller 2008, Review of Economics and Statistics 90).
 */
const KINDS = {
  conventional: "conventional",
  clustered: { cluster: "cluster" },
  bootstrap: { bootstrap: "clusters", cluster: "cluster", replicates: 39 },
} as const;
type Kind = keyof typeof KINDS;

function cover(system: RecoveredSystem, clusters: number, samples: number, kinds: readonly Kind[]) {
  return coverages(samples, (sample) => {
    const rows = 4 * clusters;
    const drawn = drawSample(system, { errors: "in clusters", rows, rowsOfACluster: 4, seed: 2000 + sample });
    const intervals = kinds.map((kind) => [kind, coefficientIntervals(drawn, estimateOf(drawn, KINDS[kind]))]);
    return Object.fromEntries(intervals);
  });
}

describe("conventional errors cover too rarely, clustered ones as they say", () => {
  it.each([
    ["la-aids", 30],
    ["aids", 40],
    ["quaids", 15],
    ["les", 40],
    ["easi", 10],
  ] as const)("%s", (system, samples) => {
    const { conventional, clustered } = cover(system, 160, samples, ["conventional", "clustered"]);
    expect(conventional.covered + conventional.bound).toBeLessThan(NOMINAL);
    expect(clustered).toSatisfy(coversAsItSays);
  });

  // Changes of prices are not alike within a cluster, so that only the clustered ones can be told.
  it("rotterdam, of periods in years", () => {
    expect(cover("rotterdam", 160, 40, ["clustered"]).clustered).toSatisfy(coversAsItSays);
  });
});

it("a bootstrap of clusters covers too", () => {
  expect(cover("aids", 160, 25, ["bootstrap"]).bootstrap).toSatisfy(coversAsItSays);
});

it("clustered errors of few clusters cover too rarely", () => {
  const { clustered } = cover("aids", 12, 60, ["clustered"]);
  expect(clustered.covered + clustered.bound).toBeLessThan(NOMINAL);
});
