import { type ComponentType, lazy, memo, Suspense, useEffect, useMemo, useState } from "react";
import type { CellKind, Finding } from "../../../shared/schemas/cell.ts";
import type { CellStatus } from "../../../shared/schemas/status.ts";
import type { LabelledTable } from "../../../shared/tables/table.ts";
import { CELL_VIEWS } from "../../cells/index.ts";
import type { CellView, FormProps } from "../../cells/types.ts";
import { afterFirstFinding, firstFindingShown } from "./first-finding.ts";

/** The view of a finding's own kind. Kind and view go together by the record, which the compiler cannot follow. */
function viewOf(kind: CellKind): CellView<CellKind> {
  return CELL_VIEWS[kind] as unknown as CellView<CellKind>;
}

const part = <P extends object>(load: () => Promise<ComponentType<P>>) => lazy(async () => ({ default: await load() }));

/** The kind of the first finding on the page; the others' views come after it. */
let first: CellKind | undefined;

function partsOf(kind: CellKind) {
  const { Band, Open, Form, Aside, Controls } = viewOf(kind);
  return {
    Band: part(() => (kind === first ? Band() : afterFirstFinding(Band))),
    Open: part(Open),
    ...(Form && { Form: part(() => afterFirstFinding(Form)) }),
    ...(Aside && { Aside: part(Aside) }),
    ...(Controls && { Controls: part(Controls) }),
  };
}

const PARTS = Object.fromEntries(
  (Object.keys(CELL_VIEWS) as CellKind[]).map((kind) => [kind, partsOf(kind)]),
) as Readonly<Record<CellKind, ReturnType<typeof partsOf>>>;

/** Begins to load what shows a kind's finding, while the finding itself is on its way. */
export function expectBand(kind: CellKind): void {
  first ??= kind;
  const { Band } = viewOf(kind);
  void (kind === first ? Band() : afterFirstFinding(Band)).catch(leaveItToTheView);
}

/** Loads what opening and copying cells of these kinds will need. */
export function expectOpening(kinds: readonly CellKind[]): void {
  void afterFirstFinding(() =>
    Promise.all(kinds.flatMap((kind) => [viewOf(kind).Open(), viewOf(kind).tables()])),
  ).catch(leaveItToTheView);
}

/** What cannot be loaded beforehand is asked for again where it is shown, and the fault told there. */
const leaveItToTheView = () => {};

/** Drawn anew only for another finding: whoever types in one cell does not wait for the tables of the others. */
export const FindingBand = memo(function FindingBand({ finding, status }: { finding: Finding; status?: CellStatus }) {
  const { Band } = PARTS[finding.kind];
  return (
    <Suspense fallback={<OnItsWay />}>
      <Band finding={finding} status={status} />
      <Readable />
    </Suspense>
  );
});

export function FindingOpen({ finding, status, form }: { finding: Finding; status?: CellStatus; form?: FormProps }) {
  const { Open } = PARTS[finding.kind];
  return (
    <Suspense fallback={<OnItsWay />}>
      <Open finding={finding} status={status} form={form} />
      <Readable />
    </Suspense>
  );
}

/** Says, once what stands beside it is on the page, that there is something to read. */
function Readable() {
  useEffect(firstFindingShown, []);
  return null;
}

export const OnItsWay = () => <p className="type-small text-ink3">Fetching the finding</p>;

/** Until the form is here, the text it writes stands in its place. */
export function CellForm({ kind, ...form }: FormProps & { kind: CellKind }) {
  const { Form } = PARTS[kind];
  const text = <pre className="type-source whitespace-pre-wrap">{form.source || " "}</pre>;
  return <Suspense fallback={text}>{Form ? <Form {...form} /> : text}</Suspense>;
}

/** What moves what a finding shows; nothing for most kinds. */
export function ControlsOf({ finding, form }: { finding: Finding; form: FormProps }) {
  const { Controls } = PARTS[finding.kind];
  return (
    Controls && (
      <Suspense>
        <Controls finding={finding} form={form} />
      </Suspense>
    )
  );
}

/** What a kind says of its finding beside it; nothing for most kinds. */
export function AsideOf({ finding }: { finding: Finding }) {
  const { Aside } = PARTS[finding.kind];
  return (
    Aside && (
      <Suspense>
        <div className="mt-6">
          <Aside finding={finding} />
        </div>
      </Suspense>
    )
  );
}

/** The tables of a finding, as soon as what makes them is here. */
export function useTables(finding: Finding | undefined): readonly LabelledTable[] | undefined {
  const [make, setMake] = useState<{ of: CellKind; tables: (finding: Finding) => LabelledTable[] }>();
  const kind = finding?.kind;
  useEffect(() => {
    if (!kind) return;
    let isHere = true;
    void afterFirstFinding(viewOf(kind).tables)
      .then((tables) => isHere && setMake({ of: kind, tables }))
      .catch(leaveItToTheView);
    return () => {
      isHere = false;
    };
  }, [kind]);
  return useMemo(() => (finding && make?.of === finding.kind ? make.tables(finding) : undefined), [finding, make]);
}
