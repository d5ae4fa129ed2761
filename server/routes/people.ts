import { Router } from "express";
import { changedPerson, newPerson } from "../../shared/schemas/resources.ts";
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

  router.post("/studies/:studyId/people", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newPerson, request.body);
    response.status(201).json(presentPerson(people.add(actor, studyId, wanted)));
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

  return router;
}
