import { describe, expect, it } from "vitest";
import { systemSpecification } from "../../../shared/schemas/system.ts";

const messages = (keys: object) => {
  const { error } = systemSpecification.safeParse({ kind: "system", data: "rows", ...keys });
  return error?.issues.map(({ path, message }) => `${path.join(".")}: ${message}`) ?? [];
};

describe("keys of easi", () => {
  it("belong to easi only", () => {
    expect(messages({ form: "aids", degree: 2 })).toEqual(["degree: degree belongs to easi; aids has none to choose"]);
    expect(messages({ form: "les", interactions: ["prices with expenditure"] })).toEqual([
      "interactions: interactions belongs to easi; les has none to choose",
    ]);
    expect(messages({ form: "la-aids", "real expenditure": "exact" })).toEqual([
      "real expenditure: real expenditure belongs to easi; la-aids has none to choose",
    ]);
    expect(messages({ form: "easi", degree: 6, "real expenditure": "approximate" })).toEqual([]);
  });

  it("name demographics where they are to interact", () => {
    const interactions = ["expenditure with demographics"];
    expect(messages({ form: "easi", interactions })).toEqual([
      "interactions: expenditure with demographics needs demographics: name at least one",
    ]);
    expect(messages({ form: "easi", interactions, demographics: ["size"] })).toEqual([]);
    expect(messages({ form: "easi", interactions, trend: true })).toEqual([]);
  });

  it("stop at the sixth degree", () => {
    expect(messages({ form: "easi", degree: 7 })).toHaveLength(1);
    expect(messages({ form: "easi", degree: 0 })).toHaveLength(1);
  });
});
