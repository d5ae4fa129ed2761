import { type RequestHandler, Router } from "express";
import { newRefereeCopy } from "../../shared/schemas/resources.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentRefereeCopy } from "../presenters/referee-copies.ts";
import type { RefereeCopyService } from "../services/referee-copies.ts";

interface Collaborators {
  readonly refereeCopies: RefereeCopyService;
  readonly limit: RequestHandler;
}

export function refereeCopyRoutes({ refereeCopies, limit }: Collaborators): Router {
  const router = Router();

  router.get("/studies/:studyId/referee-copies", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json(refereeCopies.list(actor, studyId).map(presentRefereeCopy));
  });

  router.post("/studies/:studyId/referee-copies", async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newRefereeCopy, request.body);
    const { copy, token } = await refereeCopies.seal(actor, studyId, wanted);
    response.status(201).json({ copy: presentRefereeCopy(copy), token });
  });

  router.delete("/studies/:studyId/referee-copies/:copyId", (request, response) => {
    const actor = signedIn(response);
    const copy = refereeCopies.revoke(actor, place(request.params, "studyId"), place(request.params, "copyId"));
    response.json(presentRefereeCopy(copy));
  });

  router.get("/referee/:token", limit, (request, response) => {
    const { fingerprint, content } = refereeCopies.open(String(request.params.token));
    response.json({ fingerprint, content });
  });

  return router;
}
