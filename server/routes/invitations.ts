import { type RequestHandler, Router } from "express";
import { newAccount } from "../../shared/schemas/accounts.ts";
import { newInvitation } from "../../shared/schemas/invitations.ts";
import type { Enter } from "../http/enter.ts";
import { signedIn } from "../http/session.ts";
import { place, secretOf, validate } from "../http/validate.ts";
import { presentInvitation, presentLinkedInvitation } from "../presenters/invitations.ts";
import type { InvitationService } from "../services/invitations.ts";

interface Collaborators {
  readonly invitations: InvitationService;
  readonly enter: Enter;
  readonly limitMail: RequestHandler[];
  readonly limit: RequestHandler;
}

export function invitationRoutes({ invitations, enter, limitMail, limit }: Collaborators): Router {
  const router = Router();

  router.get("/studies/:studyId/invitations", (request, response) => {
    const actor = signedIn(response);
    response.json(invitations.list(actor, place(request.params, "studyId")).map(presentInvitation));
  });

  router.post("/studies/:studyId/invitations", ...limitMail, (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newInvitation, request.body);
    response.status(201).json(presentInvitation(invitations.invite(actor, studyId, wanted)));
  });

  router.post("/studies/:studyId/invitations/:invitationId", ...limitMail, (request, response) => {
    const actor = signedIn(response);
    const { params } = request;
    const sent = invitations.sendAgain(actor, place(params, "studyId"), place(params, "invitationId"));
    response.json(presentInvitation(sent));
  });

  router.delete("/studies/:studyId/invitations/:invitationId", (request, response) => {
    const actor = signedIn(response);
    invitations.withdraw(actor, place(request.params, "studyId"), place(request.params, "invitationId"));
    response.status(204).end();
  });

  router.get("/invitations/:token", limit, (request, response) => {
    response.json(presentLinkedInvitation(invitations.open(secretOf(request.params))));
  });

  router.post("/invitations/:token", limit, (request, response) => {
    const actor = signedIn(response);
    response.json(invitations.accept(actor, secretOf(request.params)));
  });

  router.post("/invitations/:token/account", limit, async (request, response) => {
    const token = secretOf(request.params);
    const { name, password } = validate(newAccount, request.body);
    const { studyId, email } = await invitations.acceptAsNew(token, { name, passphrase: password });
    await enter(request, response, { email, password });
    response.status(201).json({ studyId });
  });

  router.delete("/invitations/:token", limit, (request, response) => {
    invitations.refuse(secretOf(request.params));
    response.status(204).end();
  });

  return router;
}
