import { type RequestHandler, Router } from "express";
import { addressAsked, changedAccount, removedAccount } from "../../shared/schemas/accounts.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentOwnAccount } from "../presenters/accounts.ts";
import { presentOpenInvitation } from "../presenters/invitations.ts";
import { presentOwnData } from "../presenters/own-data.ts";
import type { AccountService } from "../services/accounts.ts";
import type { InvitationService } from "../services/invitations.ts";
import type { OwnAccountService } from "../services/own-account.ts";

interface Collaborators {
  readonly ownAccount: OwnAccountService;
  readonly accounts: AccountService;
  readonly invitations: InvitationService;
  readonly limitMail: RequestHandler[];
  readonly limitPassphrases: RequestHandler;
}

/** What a person sees and changes of their own account. */
export function ownAccountRoutes(needs: Collaborators): Router {
  const { ownAccount, accounts, invitations, limitMail, limitPassphrases } = needs;
  const router = Router();

  router.get("/account", (_request, response) => {
    const actor = signedIn(response);
    response.json(presentOwnAccount(ownAccount.read(actor), actor.sessionId));
  });

  router.get("/account/data", (_request, response) => {
    const kept = presentOwnData(ownAccount.everything(signedIn(response)), new Date());
    response.attachment("what-is-kept.json").send(JSON.stringify(kept, null, 2));
  });

  router.patch("/account", (request, response) => {
    const actor = signedIn(response);
    accounts.rename(actor, validate(changedAccount, request.body).name);
    response.json(presentOwnAccount(ownAccount.read(actor), actor.sessionId));
  });

  router.delete("/account", limitPassphrases, async (request, response) => {
    const actor = signedIn(response);
    await ownAccount.remove(actor, validate(removedAccount, request.body).password);
    response.status(204).end();
  });

  router.post("/account/address", ...limitMail, (request, response) => {
    const actor = signedIn(response);
    accounts.askToMove(actor, validate(addressAsked, request.body).email);
    response.status(202).end();
  });

  router.delete("/account/sessions", async (_request, response) => {
    const actor = signedIn(response);
    await ownAccount.endOtherSessions(actor, actor.sessionId);
    response.status(204).end();
  });

  router.delete("/account/sessions/:sessionId", async (request, response) => {
    const actor = signedIn(response);
    await ownAccount.endSession(actor, place(request.params, "sessionId"));
    response.status(204).end();
  });

  router.get("/account/invitations", (_request, response) => {
    response.json(invitations.mine(signedIn(response)).map(presentOpenInvitation));
  });

  router.post("/account/invitations/:invitationId", (request, response) => {
    const actor = signedIn(response);
    response.json(invitations.acceptMine(actor, place(request.params, "invitationId")));
  });

  router.delete("/account/invitations/:invitationId", (request, response) => {
    const actor = signedIn(response);
    invitations.refuseMine(actor, place(request.params, "invitationId"));
    response.status(204).end();
  });

  return router;
}
