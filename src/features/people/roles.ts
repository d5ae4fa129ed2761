import type { Role } from "../../../shared/schemas/resources.ts";

export const ROLE_WORDS: Readonly<Record<Role, string>> = { owner: "owner", coauthor: "coauthor", reader: "reader" };
