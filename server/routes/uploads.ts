import { type Request, type RequestHandler, type Response, Router } from "express";
import multer from "multer";
import type { Account } from "../../shared/schemas/resources.ts";
import { invalid, tooLarge } from "../errors.ts";
import { signedIn } from "../http/session.ts";
import { place } from "../http/validate.ts";
import { presentUpload } from "../presenters/uploads.ts";
import { inMegabytes, LARGEST_UPLOAD } from "../services/upload-names.ts";
import { brokenOff, sizeRefusal, type UploadService } from "../services/uploads.ts";
import { streamingTo } from "../storage/incoming-file.ts";

/** What a form adds around its one file: boundaries and a few heads. */
const AROUND_THE_FILE = 16 * 1024;

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
    const finished = await uploads.finish(studyId, request.file.filename, whileThere(response));
    response.status(201).json(presentUpload(finished));
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
    uploads.mayAdd(actor, place(request.params, "studyId"));
    const announced = Number(request.get("content-length") ?? 0);
    if (announced > LARGEST_UPLOAD + AROUND_THE_FILE) throw tooLarge(sizeRefusal(inMegabytes(announced)));
    next();
  };
}

function receiveFile(uploads: UploadService): RequestHandler {
  const storage = streamingTo<Request>({
    store: (request, name, stream) =>
      uploads.store(request.res?.locals.account as Account, place(request.params, "studyId"), name, stream),
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
