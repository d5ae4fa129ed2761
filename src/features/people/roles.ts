import type { Role } from "../../../shared/schemas/resources.ts";

export const ROLE_WORDS: Readonly<Record<Role, string>> = { owner: "owner", coauthor: "coauthor", reader: "reader" };

/** "as an owner", "as a coauthor". */
export const asRole = (role: Role): string => `as ${role === "owner" ? "an" : "a"} ${ROLE_WORDS[role]}`;
