import type { Role } from "../../shared/schemas/resources.ts";
import type { Database } from "../db/client.ts";
import { roleIn } from "../db/queries/people.ts";
import { forbidden, notFound } from "../errors.ts";
import { type Action, type Actor, can, rolesThatMay } from "../policies/can.ts";

export interface Access {
  /** The actor's role in the study; throws 404 to someone who is no member, 403 to one who may not. */
  allow(actor: Actor, action: Action, studyId: string, madeBy?: string): Role;
  roleOf(userId: string, studyId: string): Role | undefined;
}

export function createAccess(db: Database): Access {
  const roleOf = (userId: string, studyId: string) => roleIn(db, studyId, userId);
  return {
    roleOf,
    allow(actor, action, studyId, madeBy) {
      const role = roleOf(actor.id, studyId);
      if (role === undefined) throw noSuchStudy();
      if (can(actor, action, { roleOf: () => role }, madeBy)) return role;
      const roles = rolesThatMay(action);
      // Nobody but whoever made it may, or someone of these roles.
      const wanted = roles.length === 0 ? "whoever wrote it" : `the ${roles.join(" or ")} of the study`;
      throw forbidden(`This takes ${wanted}, and you are its ${role}.`);
    },
  };
}

export const noSuchStudy = () => notFound("There is no such study, or you are not one of its people.");
