import type { AlsoKind } from "../../../shared/schemas/referee-copy.ts";

/** A cell that can be sealed: it is current. */
export interface Sealable {
  readonly cellId: string;
  readonly name: string;
  readonly kind: AlsoKind;
}

/** Written out, so that a study's page need not load the schema for five words. */
const KINDS: Readonly<Record<AlsoKind, true>> = {
  system: true,
  tests: true,
  elasticities: true,
  slutsky: true,
  text: true,
};

export const isSealable = (kind: string | null): kind is AlsoKind => kind !== null && Object.hasOwn(KINDS, kind);
