import { type Request, type RequestHandler, type Response, Router } from "express";
import multer from "multer";
import { z } from "zod";
import { fingerprint } from "../../shared/schemas/primitives.ts";
import type { Account } from "../../shared/schemas/resources.ts";
import { rowsAsked } from "../../shared/schemas/rows.ts";
import { invalid, tooLarge } from "../errors.ts";
import { signedIn } from "../http/session.ts";
import { place, validate } from "../http/validate.ts";
import { presentRows } from "../presenters/rows.ts";
import { presentUpload } from "../presenters/uploads.ts";
import { inMegabytes, LARGEST_UPLOAD } from "../services/upload-names.ts";
import { brokenOff, sizeRefusal, type UploadService } from "../services/uploads.ts";
import { streamingTo } from "../storage/incoming-file.ts";

/** What a form adds around its one file: boundaries and a few heads. */
const AROUND_THE_FILE = 16 * 1024;

/** How a file is taken in: as a new version of an upload, beside one of its name, or as it is; of a workbook, which sheet. */
const added = z.object({
  replaces: z.string().min(1).max(300).optional(),
  beside: z
    .literal("1")
    .transform(() => true)
    .optional(),
  sheet: z.string().min(1).max(100).optional(),
});
const chosenSheet = z.strictObject({ sheet: z.string().min(1).max(100) });
const rowsAskedOfCell = rowsAsked.extend({ about: z.string().min(1).max(500), fingerprint });

interface Collaborators {
  readonly uploads: UploadService;
  readonly limit: RequestHandler;
}

export function uploadRoutes({ uploads, limit }: Collaborators): Router {
  const router = Router();
  const receive = receiveFile(uploads);

  router.get("/studies/:studyId/uploads", (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    response.json(uploads.list(actor, studyId).map(presentUpload));
  });

  router.post("/studies/:studyId/uploads", mayUpload(uploads), limit, receive, async (request, response) => {
    if (request.file === undefined) throw invalid("The request brings no file: its field is called file.");
    const studyId = place(request.params, "studyId");
    const { sheet } = validate(added, request.query);
    const finished = await uploads.finish(studyId, request.file.filename, whileThere(response), sheet);
    response.status(201).json(presentUpload(finished));
  });

  router.post("/studies/:studyId/uploads/:uploadId/sheets", limit, async (request, response) => {
    const actor = signedIn(response);
    const studyId = place(request.params, "studyId");
    const { sheet } = validate(chosenSheet, request.body);
    const uploadId = await uploads.addSheet(actor, studyId, place(request.params, "uploadId"), sheet);
    response.status(201).json(presentUpload(await uploads.finish(studyId, uploadId, whileThere(response), sheet)));
  });

  router.get("/studies/:studyId/uploads/:uploadId/rows", async (request, response) => {
    const actor = signedIn(response);
    const asked = validate(rowsAsked, request.query);
    const studyId = place(request.params, "studyId");
    const uploadId = place(request.params, "uploadId");
    response.json(presentRows(await uploads.rows.ofUpload(actor, studyId, uploadId, asked, whileThere(response))));
  });

  router.get("/studies/:studyId/cells/:cellId/rows", async (request, response) => {
    const actor = signedIn(response);
    const { about, fingerprint, ...asked } = validate(rowsAskedOfCell, request.query);
    const studyId = place(request.params, "studyId");
    const cell = { studyId, cellId: place(request.params, "cellId"), about, fingerprint };
    response.json(presentRows(await uploads.rows.ofCell(actor, cell, asked, whileThere(response))));
  });

  router.delete("/studies/:studyId/uploads/:uploadId", async (request, response) => {
    const actor = signedIn(response);
    await uploads.remove(actor, place(request.params, "studyId"), place(request.params, "uploadId"));
    response.status(204).end();
  });

  return router;
}

/** Everything that can be refused before the first byte of the file is read. */
function mayUpload(uploads: UploadService): RequestHandler {
  return (request, response, next) => {
    const actor = signedIn(response);
    if (!request.is("multipart/form-data")) throw invalid("An upload is a form with one file, in the field file.");
    uploads.mayAdd(actor, place(request.params, "studyId"), validate(added, request.query));
    const announced = Number(request.get("content-length") ?? 0);
    if (announced > LARGEST_UPLOAD + AROUND_THE_FILE) throw tooLarge(sizeRefusal(inMegabytes(announced)));
    next();
  };
}

function receiveFile(uploads: UploadService): RequestHandler {
  const storage = streamingTo<Request>({
    store: (request, name, stream) =>
      uploads.store(
        request.res?.locals.account as Account,
        place(request.params, "studyId"),
        name,
        stream,
        validate(added, request.query),
      ),
    discard: uploads.discard,
  });
  const receive = multer({
    storage,
    // One byte more than is stored, so that what is cut off is never taken for the whole.
    limits: { files: 1, fields: 0, parts: 1, fileSize: LARGEST_UPLOAD + 1 },
    defParamCharset: "utf8",
  }).single("file");
  return (request, response, next) => {
    receive(request, response, (error: unknown) => {
      if (error !== undefined && request.readableAborted) return next(brokenOff());
      if (error instanceof multer.MulterError && error.code === "LIMIT_FILE_SIZE") {
        return next(tooLarge(sizeRefusal(`more than ${inMegabytes(LARGEST_UPLOAD)}`)));
      }
      if (error instanceof multer.MulterError || isNoForm(error)) {
        return next(invalid("An upload is a form with one file, in the field file."));
      }
      next(error);
    });
  };
}

/** The reader of forms has no error of its own kind for a form that is cut short or put together wrongly. */
function isNoForm(error: unknown): boolean {
  return error instanceof Error && /^(Malformed |Multipart: |Unexpected end of f)/.test(error.message);
}

/** Aborted when the client goes away before it is answered. */
function whileThere(response: Response): AbortSignal {
  const gone = new AbortController();
  response.once("close", () => {
    if (!response.writableEnded) gone.abort();
  });
  return gone.signal;
}
