import { Router } from "express";
import { changedCheckpoint, newCheckpoint } from "../../shared/schemas/history.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentCheckpoint, presentWholeCheckpoint } from "../presenters/history.ts";
import type { CheckpointService } from "../services/checkpoints.ts";

export function checkpointRoutes({ checkpoints }: { readonly checkpoints: CheckpointService }): Router {
  const router = Router();
  const all = "/studies/:studyId/checkpoints";
  const one = `${all}/:checkpointId`;

  router.get(all, (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json(checkpoints.list(actor, studyId).map(presentCheckpoint));
  });

  router.post(all, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const wanted = validate(newCheckpoint, request.body);
    response.status(201).json(presentCheckpoint(await checkpoints.make(actor, studyId, wanted)));
  });

  router.get(one, (request, response) => {
    const actor = signedIn(response);
    const [studyId, checkpointId] = [place(request.params, "studyId"), place(request.params, "checkpointId")];
    response.json(presentWholeCheckpoint(checkpoints.read(actor, studyId, checkpointId)));
  });

  router.get(`${one}/study.yaml`, (request, response) => {
    const actor = signedIn(response);
    const [studyId, checkpointId] = [place(request.params, "studyId"), place(request.params, "checkpointId")];
    const { name, text } = checkpoints.file(actor, studyId, checkpointId);
    response.attachment(`${name.replace(/[^\p{L}\p{N} _-]/gu, "").trim() || "study"}.yaml`);
    response.type("application/yaml").send(text);
  });

  router.patch(one, (request, response) => {
    const actor = signedIn(response);
    const [studyId, checkpointId] = [place(request.params, "studyId"), place(request.params, "checkpointId")];
    const change = validate(changedCheckpoint, request.body);
    response.json(presentCheckpoint(checkpoints.change(actor, studyId, checkpointId, change)));
  });

  router.post(`${one}/return`, async (request, response) => {
    const actor = signedIn(response);
    const [studyId, checkpointId] = [place(request.params, "studyId"), place(request.params, "checkpointId")];
    const { to, before } = await checkpoints.beginReturn(actor, studyId, checkpointId);
    response.status(201).json({ to: presentWholeCheckpoint(to), before: presentCheckpoint(before) });
  });

  router.delete(one, (request, response) => {
    const actor = signedIn(response);
    checkpoints.remove(actor, place(request.params, "studyId"), place(request.params, "checkpointId"));
    response.status(204).end();
  });

  return router;
}
