import { Router } from "express";
import type { Account, Installation } from "../../shared/schemas/resources.ts";
import { signedIn } from "../http/session.ts";
import type { AdministrationService } from "../services/administration.ts";

interface Collaborators {
  readonly installation: Installation;
  readonly administration: Pick<AdministrationService, "isAdministrator">;
}

/** What the sign-in page needs before anyone has signed in, and who has. */
export function doorRoutes({ installation, administration }: Collaborators): Router {
  const router = Router();
  router.get("/installation", (_request, response) => {
    response.json(installation);
  });
  router.get("/me", (_request, response) => {
    const actor = signedIn(response);
    const { id, name, email } = actor;
    const standing = administration.isAdministrator(actor) && { isAdministrator: true };
    response.json({ id, name, email, ...standing } satisfies Account);
  });
  return router;
}
