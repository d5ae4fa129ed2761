import compression from "compression";
import express, { type Express, type RequestHandler } from "express";
import type { Logger } from "pino";
import type { Installation } from "../shared/schemas/resources.ts";
import type { Config } from "./config.ts";
import { authenticationRoutes } from "./http/authentication.ts";
import { answerErrors, nothingHere } from "./http/errors.ts";
import { limitRefereeReads, limitRemarks, limitUploads } from "./http/limits.ts";
import { logRequests } from "./http/log.ts";
import { ownPagesOnly } from "./http/origin.ts";
import { neverKept, protectPages } from "./http/security.ts";
import { readSession } from "./http/session.ts";
import { cellRoutes } from "./routes/cells.ts";
import { checkpointRoutes } from "./routes/checkpoints.ts";
import { doorRoutes } from "./routes/door.ts";
import { historyRoutes } from "./routes/history.ts";
import { peopleRoutes } from "./routes/people.ts";
import { refereeCopyRoutes } from "./routes/referee-copies.ts";
import { remarkRoutes } from "./routes/remarks.ts";
import { studyRoutes } from "./routes/studies.ts";
import { uploadRoutes } from "./routes/uploads.ts";
import type { Authentication } from "./services/authentication.ts";
import type { Services } from "./services/index.ts";

export interface AppDependencies {
  readonly config: Pick<Config, "trustedOrigins" | "secure" | "proxies" | "limits" | "development">;
  readonly auth: Authentication;
  readonly services: Services;
  readonly installation: Installation;
  readonly logger: Logger;
  /** What answers everything that is not the API: the built pages, or Vite in development. */
  readonly pages: RequestHandler;
}

/** More than anyone writes by hand. */
const REMARKS_PER_MINUTE = 30;

/** The web application over its collaborators; opens nothing and listens to nothing itself. */
export function createApp({ config, auth, services, installation, logger, pages }: AppDependencies): Express {
  const app = express();
  app.disable("x-powered-by");
  app.set("trust proxy", config.proxies);
  app.set("query parser", "simple");
  app.use(logRequests(logger));
  app.use(protectPages(config));
  app.use(compression());
  app.use("/api", neverKept, ownPagesOnly(config.trustedOrigins), express.json({ limit: "256kb" }));
  app.use("/api/auth", authenticationRoutes({ auth, limits: config.limits, signedOut: services.signedOut }));
  app.use("/api", readSession(auth), apiRoutes({ config, services, installation }), nothingHere);
  app.use(pages);
  app.use(answerErrors);
  return app;
}

function apiRoutes({ config, services, installation }: Pick<AppDependencies, "config" | "services" | "installation">) {
  const router = express.Router();
  const { studies, people, uploads, cells, refereeCopies, remarks, access, history, checkpoints } = services;
  router.use(doorRoutes({ installation }));
  router.use(studyRoutes({ studies }));
  router.use(peopleRoutes({ people }));
  router.use(uploadRoutes({ uploads, limit: limitUploads(config.limits.uploadsPerHour) }));
  router.use(cellRoutes({ cells, access }));
  router.use(remarkRoutes({ remarks, limit: limitRemarks(REMARKS_PER_MINUTE) }));
  router.use(historyRoutes({ history }));
  router.use(checkpointRoutes({ checkpoints }));
  router.use(refereeCopyRoutes({ refereeCopies, limit: limitRefereeReads(config.limits.refereeReadsPerMinute) }));
  return router;
}
