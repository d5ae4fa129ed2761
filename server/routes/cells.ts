import { type Request, type Response, Router } from "express";
import { fingerprint } from "../../shared/schemas/primitives.ts";
import { notFound } from "../errors.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import type { Action } from "../policies/can.ts";
import { presentFinding } from "../presenters/findings.ts";
import type { Access } from "../services/access.ts";
import type { Cells } from "../services/ports.ts";

/** States of cells, estimations and findings. Estimations answer at once; the socket tells how they go on. */
export function cellRoutes({ cells, access }: { readonly cells: Cells; readonly access: Access }): Router {
  const router = Router();

  /** Who asks, and in which study, once that is settled. */
  function allowed(request: Request, response: Response, action: Action) {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    access.allow(actor, action, studyId);
    return { actor, studyId };
  }

  async function knownCell(studyId: string, cellId: string): Promise<string> {
    const { cells: all } = await cells.status(studyId);
    if (all.some((cell) => cell.cellId === cellId)) return cellId;
    throw notFound("There is no such cell in this study.");
  }

  router.get("/studies/:studyId/status", async (request, response) => {
    const { studyId } = allowed(request, response, "finding.read");
    response.json(await cells.status(studyId));
  });

  router.get("/studies/:studyId/findings/:fingerprint", async (request, response) => {
    signedIn(response);
    const asked = validate(fingerprint, request.params.fingerprint);
    const { studyId } = allowed(request, response, "finding.read");
    const stored = await cells.finding(studyId, asked);
    if (stored === undefined) throw notFound("Nothing is stored under this fingerprint in this study.");
    response.json(presentFinding(stored));
  });

  router
    .route("/studies/:studyId/cells/:cellId/estimation")
    .post(async (request, response) => {
      const { actor, studyId } = allowed(request, response, "estimation.start");
      await cells.estimate(studyId, await knownCell(studyId, place(request.params, "cellId")), actor.id);
      response.status(202).json(await cells.status(studyId));
    })
    .delete(async (request, response) => {
      const { studyId } = allowed(request, response, "estimation.cancel");
      await cells.cancel(studyId, await knownCell(studyId, place(request.params, "cellId")));
      response.json(await cells.status(studyId));
    });

  router.post("/studies/:studyId/estimations", async (request, response) => {
    const { actor, studyId } = allowed(request, response, "estimation.start");
    await cells.bringUpToDate(studyId, actor.id);
    response.status(202).json(await cells.status(studyId));
  });

  return router;
}
