export { useStudyConnection, useStudyPart } from "./hooks.ts";
export { forgetAccount } from "./keeping.ts";
export { type KeptWords, keptWords, letGo } from "./kept-words.ts";
export type { Undone } from "./own-edits.ts";
export { colourOf, type PersonColour, type Whereabouts } from "./people.ts";
export type { ConnectionState, StoredState } from "./snapshot.ts";
export type { StudyConnection } from "./study.ts";
