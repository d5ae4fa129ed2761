import { Router } from "express";
import { journalFrom } from "../../shared/schemas/journal.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentAccount, presentMail } from "../presenters/accounts.ts";
import { presentJournal } from "../presenters/journal.ts";
import type { AdministrationService } from "../services/administration.ts";

/** For whoever administers the installation. */
export function administrationRoutes({ administration }: { readonly administration: AdministrationService }): Router {
  const router = Router();

  router.get("/administration/mails", (_request, response) => {
    const { kind, mails } = administration.mails(signedIn(response));
    response.json({ kind, mails: mails.map(presentMail) });
  });

  router.post("/administration/mails/:mailId", (request, response) => {
    const actor = signedIn(response);
    response.json(presentMail(administration.tryAgain(actor, place(request.params, "mailId"))));
  });

  router.get("/administration/accounts", (_request, response) => {
    response.json(administration.accounts(signedIn(response)).map(presentAccount));
  });

  router.get("/administration/journal", (request, response) => {
    const actor = signedIn(response);
    const { before } = validate(journalFrom, request.query);
    response.json(presentJournal(administration.journal(actor, before)));
  });

  return router;
}
