import { memo } from "react";
import type { CellKind, Finding } from "../../../shared/schemas/cell.ts";
import type { CellStatus } from "../../../shared/schemas/status.ts";
import { CELL_VIEWS } from "../../cells/index.ts";
import type { CellView, FormProps } from "../../cells/types.ts";

/** The view of a finding's own kind. Kind and view go together by the record, which the compiler cannot follow. */
export function viewOf(kind: CellKind): CellView<CellKind> {
  return CELL_VIEWS[kind] as unknown as CellView<CellKind>;
}

/** Drawn anew only for another finding: whoever types in one cell does not wait for the tables of the others. */
export const FindingBand = memo(function FindingBand({ finding, status }: { finding: Finding; status?: CellStatus }) {
  const { Band } = viewOf(finding.kind);
  return <Band finding={finding} status={status} />;
});

export function FindingOpen({ finding, status, form }: { finding: Finding; status?: CellStatus; form?: FormProps }) {
  const { Open } = viewOf(finding.kind);
  return <Open finding={finding} status={status} form={form} />;
}

export function CellForm({ kind, ...form }: FormProps & { kind: CellKind }) {
  const { Form } = viewOf(kind);
  return <Form {...form} />;
}
