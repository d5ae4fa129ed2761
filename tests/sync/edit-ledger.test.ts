import { describe, expect, it } from "vitest";
import { EditLedger } from "../../src/sync/edit-ledger.ts";

describe("the ledger of edits", () => {
  it("calls an edit stored when the first write that holds it is", () => {
    const ledger = new EditLedger();
    ledger.connecting();
    ledger.wrote();
    ledger.edited();
    ledger.wrote();
    ledger.edited();
    ledger.wrote();
    ledger.acknowledged(1);
    expect([ledger.unstored, ledger.everythingStored]).toEqual([2, false]);
    ledger.acknowledged(2);
    expect(ledger.unstored).toBe(1);
    ledger.acknowledged(3);
    expect([ledger.unstored, ledger.everythingStored]).toEqual([0, true]);
  });

  it("takes what was not acknowledged into the first write of the next connection", () => {
    const ledger = new EditLedger();
    ledger.connecting();
    ledger.wrote();
    ledger.edited();
    ledger.wrote();
    ledger.acknowledged(1);
    ledger.connecting();
    ledger.edited();
    ledger.acknowledged(0);
    expect(ledger.unstored).toBe(2);
    ledger.wrote();
    ledger.acknowledged(1);
    expect(ledger.everythingStored).toBe(true);
  });

  it("knows nothing of an earlier visit until the first write is acknowledged", () => {
    const ledger = new EditLedger(3);
    ledger.connecting();
    expect([ledger.unstored, ledger.everythingStored]).toEqual([3, false]);
    const empty = new EditLedger();
    expect([empty.unstored, empty.everythingStored]).toEqual([0, false]);
    ledger.wrote();
    ledger.acknowledged(1);
    expect(ledger.everythingStored).toBe(true);
  });

  it("does not believe in acknowledgements of writes it has not made", () => {
    const ledger = new EditLedger();
    ledger.connecting();
    ledger.edited();
    ledger.acknowledged(5);
    expect(ledger.unstored).toBe(1);
    ledger.wrote();
    ledger.acknowledged(1);
    ledger.acknowledged(1);
    expect(ledger.everythingStored).toBe(true);
  });
});
