import { onlineManager } from "@tanstack/react-query";
import { describe, expect, it, vi } from "vitest";
import { ApiRefusal } from "../../../src/lib/api.ts";
import { createQueryClient } from "../../../src/lib/query-client.ts";

const refused = (status: number) => () => Promise.reject(new ApiRefusal(status, "refused", "No."));

describe("the query client", () => {
  it("says that the session has ended, unless that is just what was asked", async () => {
    const onSignedOut = vi.fn();
    const client = createQueryClient(onSignedOut);
    await client.fetchQuery({ queryKey: ["me"], queryFn: refused(401) }).catch(() => {});
    await client.fetchQuery({ queryKey: ["studies"], queryFn: refused(403) }).catch(() => {});
    expect(onSignedOut).not.toHaveBeenCalled();
    await client.fetchQuery({ queryKey: ["studies"], queryFn: refused(401) }).catch(() => {});
    expect(onSignedOut).toHaveBeenCalledOnce();
  });

  it("lets what is asked without a network fail, so that it is said, rather than wait in silence", async () => {
    onlineManager.setOnline(false);
    try {
      const client = createQueryClient(() => {});
      const mutation = client.getMutationCache().build(client, { mutationFn: refused(0) });
      await expect(mutation.execute(undefined)).rejects.toBeInstanceOf(ApiRefusal);
    } finally {
      onlineManager.setOnline(true);
    }
  });
});
