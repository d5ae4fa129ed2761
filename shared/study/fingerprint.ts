import type { CellKind, CellSpecification } from "../schemas/cell.ts";
import { canonicalJson } from "./canonical-json.ts";
import { normaliseSpecification } from "./normalise.ts";
import { withoutCellNames } from "./quotations.ts";
import { sha256Hex } from "./sha256.ts";
import { REFERENCES } from "./vocabulary.ts";

export { canonicalJson, sha256Hex };

export interface FingerprintParts {
  readonly kind: CellKind;
  readonly specification: CellSpecification;
  /** Fingerprints of the cells it reads, in the order of its keys. */
  readonly upstream: readonly string[];
  /** SHA-256 of the upload's bytes, for data cells. */
  readonly uploadSha?: string;
  /** The version of everything that computes: another version may find other digits. */
  readonly engineVersion: string;
}

/**
 * The fingerprint under which a cell's finding is stored: SHA-256 over everything the finding depends
 * on. Comments, the order of keys and defaults written or not do not matter, and neither do the names
 * of cells, since what a cell reads enters by its own fingerprint. The order of goods does matter.
 */
export function fingerprintCell(parts: FingerprintParts): string {
  return sha256Hex(
    canonicalJson({
      engine: parts.engineVersion,
      kind: parts.kind,
      specification: asked(normaliseSpecification(parts.specification)),
      upstream: parts.upstream,
      upload: parts.uploadSha,
    }),
  );
}

/** The specification without names of other cells, and with maps whose order has a meaning as lists. */
function asked(specification: CellSpecification): Record<string, unknown> {
  const references = REFERENCES[specification.kind];
  const kept = Object.entries(specification).filter(([key]) => !Object.hasOwn(references, key));
  const plain: Record<string, unknown> = Object.fromEntries(kept);
  if (specification.kind === "data") {
    plain.goods = Object.entries(specification.goods);
    plain.derive = specification.derive && Object.entries(specification.derive);
    // Which bytes are read enters by their own hash: to name the version that is read anyhow asks nothing else.
    delete plain.version;
  }
  if (specification.kind === "text") plain.text = withoutCellNames(specification.text);
  return plain;
}
