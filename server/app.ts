import compression from "compression";
import express, { type Express, type RequestHandler } from "express";
import type { Logger } from "pino";
import type { Installation } from "../shared/schemas/resources.ts";
import type { Config } from "./config.ts";
import { authenticationRoutes } from "./http/authentication.ts";
import { enterBy } from "./http/enter.ts";
import { answerErrors, nothingHere } from "./http/errors.ts";
import {
  limitLinks,
  limitMail,
  limitPassphrases,
  limitRefereeReads,
  limitRemarks,
  limitUploads,
} from "./http/limits.ts";
import { logRequests } from "./http/log.ts";
import { ownPagesOnly } from "./http/origin.ts";
import { neverKept, protectPages } from "./http/security.ts";
import { readSession } from "./http/session.ts";
import { accountRoutes } from "./routes/accounts.ts";
import { administrationRoutes } from "./routes/administration.ts";
import { cellRoutes } from "./routes/cells.ts";
import { checkpointRoutes } from "./routes/checkpoints.ts";
import { deletedStudyRoutes } from "./routes/deleted-studies.ts";
import { doorRoutes } from "./routes/door.ts";
import { historyRoutes } from "./routes/history.ts";
import { invitationRoutes } from "./routes/invitations.ts";
import { journalRoutes } from "./routes/journal.ts";
import { ownAccountRoutes } from "./routes/own-account.ts";
import { peopleRoutes } from "./routes/people.ts";
import { refereeCopyRoutes } from "./routes/referee-copies.ts";
import { remarkRoutes } from "./routes/remarks.ts";
import { replicationBundleRoutes } from "./routes/replication-bundles.ts";
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
  const { limits } = config;
  const { locked, passphraseChanged } = services.accountEvents;
  // One count for every way to have a message sent.
  const mailLimits = limitMail(limits.mailsPerHour);
  app.use(
    "/api/auth",
    authenticationRoutes({
      auth,
      limits,
      limitMail: mailLimits,
      locked,
      async passphraseChanged(account) {
        await services.ownAccount.endOtherSessions(account, account.sessionId);
        passphraseChanged(account);
      },
    }),
  );
  app.use("/api", readSession(auth));
  app.use("/api", peopleApi({ auth, config, services, installation, mailLimits }));
  app.use("/api", apiRoutes({ config, services }), nothingHere);
  app.use(pages);
  app.use(answerErrors);
  return app;
}

type PeopleApi = Pick<AppDependencies, "auth" | "config" | "services" | "installation"> & {
  readonly mailLimits: RequestHandler[];
};

/** Who comes in, who is in a study or reads a copy of it, whose the installation is: all that has messages sent. */
function peopleApi({ auth, config, services, installation, mailLimits }: PeopleApi) {
  const router = express.Router();
  const { people, accounts, ownAccount, invitations, refereeCopies, administration, journal } = services;
  const enter = enterBy(auth);
  const limit = limitLinks(config.limits.signInsPerMinute);
  router.use(doorRoutes({ installation, administration }));
  router.use(accountRoutes({ accounts, enter, limitMail: mailLimits, limit }));
  router.use(
    ownAccountRoutes({
      ownAccount,
      accounts,
      invitations,
      limitMail: mailLimits,
      limitPassphrases: limitPassphrases(),
    }),
  );
  router.use(peopleRoutes({ people }));
  router.use(invitationRoutes({ invitations, enter, limitMail: mailLimits, limit }));
  router.use(journalRoutes({ journal }));
  router.use(
    refereeCopyRoutes({
      refereeCopies,
      limit: limitRefereeReads(config.limits.refereeReadsPerMinute),
      limitMail: mailLimits,
    }),
  );
  router.use(administrationRoutes({ administration }));
  return router;
}

function apiRoutes({ config, services }: Pick<AppDependencies, "config" | "services">) {
  const router = express.Router();
  const { studies, uploads, cells, remarks, access, history, checkpoints, replicationBundles } = services;
  router.use(studyRoutes({ studies }));
  router.use(deletedStudyRoutes({ studies }));
  router.use(uploadRoutes({ uploads, limit: limitUploads(config.limits.uploadsPerHour) }));
  router.use(cellRoutes({ cells, access }));
  router.use(remarkRoutes({ remarks, limit: limitRemarks(REMARKS_PER_MINUTE) }));
  router.use(historyRoutes({ history }));
  router.use(checkpointRoutes({ checkpoints }));
  router.use(replicationBundleRoutes({ replicationBundles }));
  return router;
}
