import { type RequestHandler, Router } from "express";
import { addressAsked, newAccount } from "../../shared/schemas/accounts.ts";
import type { Enter } from "../http/enter.ts";
import { secretOf, validate } from "../http/validate.ts";
import type { AccountService } from "../services/accounts.ts";

interface Collaborators {
  readonly accounts: AccountService;
  readonly enter: Enter;
  /** On what makes a message leave, by the caller's address and by the address written to. */
  readonly limitMail: RequestHandler[];
  readonly limit: RequestHandler;
}

/** Making an account: an address asks, its reader follows the link. Every address gets the same answer. */
export function accountRoutes({ accounts, enter, limitMail, limit }: Collaborators): Router {
  const router = Router();

  router.post("/account-links", ...limitMail, (request, response) => {
    accounts.ask(validate(addressAsked, request.body).email);
    response.status(202).end();
  });

  router.get("/account-links/:token", limit, (request, response) => {
    response.json({ email: accounts.addressOf(secretOf(request.params)) });
  });

  router.post("/account-links/:token", limit, async (request, response) => {
    const token = secretOf(request.params);
    const { name, password } = validate(newAccount, request.body);
    const { email } = await accounts.finish(token, { name, passphrase: password });
    await enter(request, response, { email, password });
    response.status(201).json({ email });
  });

  router.post("/address-links/:token", limit, (request, response) => {
    response.json({ email: accounts.move(secretOf(request.params)).email });
  });

  return router;
}
