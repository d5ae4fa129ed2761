import { type RequestHandler, Router } from "express";
import { changedRefereeCopy, newRefereeCopy, newRefereeLink } from "../../shared/schemas/referee-copies.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentRefereeCopy } from "../presenters/referee-copies.ts";
import type { RefereeCopyService } from "../services/referee-copies.ts";

interface Collaborators {
  readonly refereeCopies: RefereeCopyService;
  /** Of reading by a link. */
  readonly limit: RequestHandler;
  readonly limitMail: readonly RequestHandler[];
}

export function refereeCopyRoutes({ refereeCopies, limit, limitMail }: Collaborators): Router {
  const router = Router();
  const sends = whereMailed(limitMail);

  router.get("/studies/:studyId/referee-copies", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json(refereeCopies.list(actor, studyId).map(presentRefereeCopy));
  });

  router.post("/studies/:studyId/referee-copies", ...sends, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newRefereeCopy, request.body);
    const { copy, token } = await refereeCopies.seal(actor, studyId, wanted);
    response.status(201).json({ copy: presentRefereeCopy(copy), token });
  });

  router.patch("/studies/:studyId/referee-copies/:copyId", (request, response) => {
    const actor = signedIn(response);
    const { expiresAt } = validate(changedRefereeCopy, request.body);
    const [studyId, copyId] = [place(request.params, "studyId"), place(request.params, "copyId")];
    response.json(presentRefereeCopy(refereeCopies.change(actor, studyId, copyId, expiresAt)));
  });

  router.post("/studies/:studyId/referee-copies/:copyId/link", ...sends, (request, response) => {
    const actor = signedIn(response);
    const { email } = validate(newRefereeLink, request.body);
    const [studyId, copyId] = [place(request.params, "studyId"), place(request.params, "copyId")];
    const { copy, token } = refereeCopies.renew(actor, studyId, copyId, email);
    response.status(201).json({ copy: presentRefereeCopy(copy), token });
  });

  router.delete("/studies/:studyId/referee-copies/:copyId", (request, response) => {
    const actor = signedIn(response);
    const copy = refereeCopies.revoke(actor, place(request.params, "studyId"), place(request.params, "copyId"));
    response.json(presentRefereeCopy(copy));
  });

  router.get("/referee/:token", limit, (request, response) => {
    const { fingerprint, content, newer } = refereeCopies.open(String(request.params.token));
    response.json({ fingerprint, content, ...(newer && { newer }) });
  });

  router.get("/referee/:token/newest", limit, (request, response) => {
    const { fingerprint, content } = refereeCopies.openNewest(String(request.params.token));
    response.json({ fingerprint, content });
  });

  return router;
}

/** Limits that count only requests which have a message sent. */
function whereMailed(limits: readonly RequestHandler[]): RequestHandler[] {
  return limits.map((limit): RequestHandler => {
    return (request, response, next) => (request.body?.email === undefined ? next() : limit(request, response, next));
  });
}
