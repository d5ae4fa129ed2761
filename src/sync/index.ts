export { useCell, useStudyConnection, useStudyPart } from "./hooks.ts";
export { forgetAccount } from "./keeping.ts";
export { colourOf, type PersonColour, type Whereabouts } from "./people.ts";
export type { ConnectionState, StoredState, StudySnapshot } from "./snapshot.ts";
export { openStudy, type StudyConnection } from "./study.ts";
