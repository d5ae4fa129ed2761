import { Router } from "express";
import { changedStudy, newStudy } from "../../shared/schemas/resources.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentStudy } from "../presenters/studies.ts";
import type { StudyService } from "../services/studies.ts";

export function studyRoutes({ studies }: { readonly studies: StudyService }): Router {
  const router = Router();

  router.get("/studies", async (_request, response) => {
    const actor = signedIn(response);
    response.json((await studies.list(actor)).map(presentStudy));
  });

  router.post("/studies", async (request, response) => {
    const actor = signedIn(response);
    const wanted = validate(newStudy, request.body);
    response.status(201).json(presentStudy(await studies.create(actor, wanted)));
  });

  router.get("/studies/:studyId", async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json(presentStudy(await studies.read(actor, studyId)));
  });

  router.patch("/studies/:studyId", async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const change = validate(changedStudy, request.body);
    response.json(presentStudy(await studies.change(actor, studyId, change)));
  });

  router.post("/studies/:studyId/put-away", (request, response) => {
    studies.putAway(signedIn(response), place(request.params, "studyId"), true);
    response.status(204).end();
  });

  router.delete("/studies/:studyId/put-away", (request, response) => {
    studies.putAway(signedIn(response), place(request.params, "studyId"), false);
    response.status(204).end();
  });

  router.delete("/studies/:studyId", (request, response) => {
    const actor = signedIn(response);
    studies.delete(actor, place(request.params, "studyId"));
    response.status(204).end();
  });

  return router;
}
