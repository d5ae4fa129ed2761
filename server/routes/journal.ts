import { Router } from "express";
import { journalFrom } from "../../shared/schemas/journal.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentJournal } from "../presenters/journal.ts";
import type { JournalService } from "../services/journal.ts";

export function journalRoutes({ journal }: { readonly journal: JournalService }): Router {
  const router = Router();

  router.get("/studies/:studyId/journal", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const { before } = validate(journalFrom, request.query);
    response.json(presentJournal(journal.list(actor, studyId, before)));
  });

  return router;
}
