import { Router } from "express";
import { changedPerson, handedOver } from "../../shared/schemas/resources.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentPerson } from "../presenters/studies.ts";
import type { PeopleService } from "../services/people.ts";

export function peopleRoutes({ people }: { readonly people: PeopleService }): Router {
  const router = Router();

  router.get("/studies/:studyId/people", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json(people.list(actor, studyId).map(presentPerson));
  });

  router.patch("/studies/:studyId/people/:userId", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const userId = place(request.params, "userId");
    const { role } = validate(changedPerson, request.body);
    response.json(presentPerson(people.change(actor, studyId, userId, role)));
  });

  router.delete("/studies/:studyId/people/:userId", (request, response) => {
    const actor = signedIn(response);
    people.remove(actor, place(request.params, "studyId"), place(request.params, "userId"));
    response.status(204).end();
  });

  router.post("/studies/:studyId/owner", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const { userId } = validate(handedOver, request.body);
    response.json(people.handOver(actor, studyId, userId).map(presentPerson));
  });

  return router;
}
