import { Router } from "express";
import type { DeletedStudy } from "../../shared/schemas/accounts.ts";
import { signedIn } from "../http/session.ts";
import { place } from "../http/validate.ts";
import type { DeletedStudy as DeletedStudyView, StudyService } from "../services/studies.ts";

/** Studies deleted by their owner that can still be brought back. */
export function deletedStudyRoutes({ studies }: { readonly studies: StudyService }): Router {
  const router = Router();

  router.get("/deleted-studies", (_request, response) => {
    response.json(studies.listDeleted(signedIn(response)).map(presentDeleted));
  });

  router.post("/deleted-studies/:studyId", (request, response) => {
    studies.bringBack(signedIn(response), place(request.params, "studyId"));
    response.status(204).end();
  });

  router.delete("/deleted-studies/:studyId", (request, response) => {
    studies.deleteForGood(signedIn(response), place(request.params, "studyId"));
    response.status(204).end();
  });

  return router;
}

function presentDeleted({ study, deletedAt, purgedAt }: DeletedStudyView): DeletedStudy {
  const { id, title, lede } = study;
  return { id, title, lede, deletedAt: deletedAt.toISOString(), purgedAt: purgedAt.toISOString() };
}
