import { createReadStream } from "node:fs";
import { pipeline } from "node:stream/promises";
import { Router } from "express";
import { newReplicationBundle } from "../../shared/schemas/replication-bundle.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import type { ReplicationBundleService } from "../services/replication-bundles.ts";

/** A bundle is made for whoever asks and sent at once; whoever goes away before it is made, cancels it. */
export function replicationBundleRoutes({
  replicationBundles,
}: {
  readonly replicationBundles: ReplicationBundleService;
}): Router {
  const router = Router();

  router.post("/studies/:studyId/replication-bundles", async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newReplicationBundle, request.body);
    const gone = new AbortController();
    response.on("close", () => gone.abort());
    const made = await replicationBundles.make(actor, studyId, wanted, gone.signal);
    try {
      response.status(201).type("application/zip").attachment(made.name).set("Content-Length", String(made.bytes));
      await pipeline(createReadStream(made.path), response);
    } finally {
      await made.remove();
    }
  });

  return router;
}
