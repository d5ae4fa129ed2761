import { type RequestHandler, Router } from "express";
import { newRemark, remarkWords, settledOrNot } from "../../shared/schemas/remarks.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentRemark, presentReply } from "../presenters/remarks.ts";
import type { RemarkService } from "../services/remarks.ts";

interface Collaborators {
  readonly remarks: RemarkService;
  /** How often one person may write. */
  readonly limit: RequestHandler;
}

export function remarkRoutes({ remarks, limit }: Collaborators): Router {
  const router = Router();

  router.get("/studies/:studyId/remarks", async (request, response) => {
    const actor = signedIn(response);
    const list = await remarks.list(actor, place(request.params, "studyId"));
    response.json(list.map(presentRemark));
  });

  router.post("/studies/:studyId/remarks", limit, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newRemark, request.body);
    response.status(201).json(presentRemark(await remarks.add(actor, studyId, wanted)));
  });

  router.patch("/studies/:studyId/remarks/:remarkId", limit, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const remarkId = place(request.params, "remarkId");
    const { text } = validate(remarkWords, request.body);
    response.json(presentRemark(await remarks.edit(actor, studyId, remarkId, text)));
  });

  router.patch("/studies/:studyId/remarks/:remarkId/settled", limit, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const remarkId = place(request.params, "remarkId");
    const { settled } = validate(settledOrNot, request.body);
    response.json(presentRemark(await remarks.settle(actor, studyId, remarkId, settled)));
  });

  router.delete("/studies/:studyId/remarks/:remarkId", (request, response) => {
    const actor = signedIn(response);
    remarks.withdraw(actor, place(request.params, "studyId"), place(request.params, "remarkId"));
    response.status(204).end();
  });

  router.post("/studies/:studyId/remarks/:remarkId/replies", limit, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const remarkId = place(request.params, "remarkId");
    const { text } = validate(remarkWords, request.body);
    response.status(201).json(presentReply(await remarks.reply(actor, studyId, remarkId, text)));
  });

  router.patch("/studies/:studyId/remarks/:remarkId/replies/:replyId", limit, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const remarkId = place(request.params, "remarkId");
    const replyId = place(request.params, "replyId");
    const { text } = validate(remarkWords, request.body);
    response.json(presentReply(await remarks.editReply(actor, studyId, remarkId, replyId, text)));
  });

  router.delete("/studies/:studyId/remarks/:remarkId/replies/:replyId", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    remarks.withdrawReply(actor, studyId, place(request.params, "remarkId"), place(request.params, "replyId"));
    response.status(204).end();
  });

  return router;
}
