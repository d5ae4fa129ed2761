import { Router } from "express";
import { historyQuery } from "../../shared/schemas/history.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentHistory, presentLatestEdit } from "../presenters/history.ts";
import type { HistoryService } from "../services/history.ts";

export function historyRoutes({ history }: { readonly history: HistoryService }): Router {
  const router = Router();

  router.get("/studies/:studyId/history", async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const query = validate(historyQuery, { ...request.query });
    response.json(presentHistory(await history.read(actor, studyId, query)));
  });

  router.get("/studies/:studyId/history/latest", async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json((await history.latest(actor, studyId)).map(presentLatestEdit));
  });

  return router;
}
