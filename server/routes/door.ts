import { Router } from "express";
import type { Account, Installation } from "../../shared/schemas/resources.ts";
import { signedIn } from "../http/session.ts";

/** What the sign-in page needs before anyone has signed in, and who has. */
export function doorRoutes({ installation }: { readonly installation: Installation }): Router {
  const router = Router();
  router.get("/installation", (_request, response) => {
    response.json(installation);
  });
  router.get("/me", (_request, response) => {
    const { id, name, email } = signedIn(response);
    response.json({ id, name, email } satisfies Account);
  });
  return router;
}
