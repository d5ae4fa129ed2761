import type { Role } from "../../shared/schemas/resources.ts";
import type { Database } from "../db/client.ts";
import { roleIn, roleInDeleted } from "../db/queries/people.ts";
import { forbidden, notFound } from "../errors.ts";
import { type Action, type Actor, can, rolesThatMay } from "../policies/can.ts";

export interface Access {
  /** The actor's role in the study; throws 404 to someone who is no member, 403 to one who may not. */
  allow(actor: Actor, action: Action, studyId: string, madeBy?: string): Role;
  /** The same of a study that is deleted and not yet purged; to everyone else it is not there. */
  allowDeleted(actor: Actor, action: Action, studyId: string): Role;
  roleOf(userId: string, studyId: string): Role | undefined;
}

export function createAccess(db: Database): Access {
  const roleOf = (userId: string, studyId: string) => roleIn(db, studyId, userId);
  function allowAs(role: Role | undefined, actor: Actor, action: Action, madeBy?: string): Role {
    if (role === undefined) throw noSuchStudy();
    if (can(actor, action, { roleOf: () => role }, madeBy)) return role;
    const roles = rolesThatMay(action);
    // Nobody but whoever made it may, or someone of these roles.
    const wanted = roles.length === 0 ? "whoever wrote it" : `the ${roles.join(" or ")} of the study`;
    throw forbidden(`This takes ${wanted}, and you are its ${role}.`);
  }
  return {
    roleOf,
    allow: (actor, action, studyId, madeBy) => allowAs(roleOf(actor.id, studyId), actor, action, madeBy),
    allowDeleted(actor, action, studyId) {
      const role = roleInDeleted(db, studyId, actor.id);
      // Nobody but those who may bring it back is told that it was.
      if (role === undefined || !rolesThatMay(action).includes(role)) throw noSuchStudy();
      return role;
    },
  };
}

export const noSuchStudy = () => notFound("There is no such study, or you are not one of its people.");
