import { type ReactNode, useCallback, useEffect } from "react";
import type { QuotedNumber, TextFinding } from "../../../shared/schemas/text.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { quotationsInWords } from "../../../shared/tables/text-finding.ts";
import { WhereCellsAreProvider } from "../../cells/text/where-cells-are.ts";
import { LinkWord } from "../../components/button.tsx";
import { pages } from "../../lib/paths.ts";
import { addressOf } from "./addresses.ts";
import { useAllStandings } from "./all-standings.ts";
import { CopyWord } from "./copy-word.tsx";
import { FindingBand, FindingOpen, OnItsWay } from "./finding-view.tsx";
import { firstFindingShown } from "./first-finding.ts";
import { ProblemList } from "./problem-list.tsx";
import type { Standing } from "./standing.ts";
import { StateLine } from "./state-line.tsx";
import { useTextFinding } from "./use-text-finding.ts";

interface TextCellProps {
  readonly studyId: string;
  readonly standing: Standing;
  readonly beside?: ReactNode;
  /** Absent for those who only read. */
  readonly onChange?: (nextSource: string) => void;
  /** In full, on a page of its own. */
  readonly opened?: boolean;
}

/** The right page of a text cell: the text as it reads now, whatever becomes of the cells it quotes. */
export default function TextCell({ studyId, standing, beside, onChange, opened }: TextCellProps) {
  const finding = useTextFinding(studyId, standing);
  const standings = useAllStandings();
  useEffect(firstFindingShown, []);
  const { cell } = standing;
  const addresses = useCallback(
    (name: string) => {
      const found: CellSource | undefined = standings.find((one) => one.cell.name === name)?.cell;
      if (found === undefined) return undefined;
      return opened ? pages.cell(studyId, found.id) : addressOf(found.id);
    },
    [standings, opened, studyId],
  );
  const isEmpty = cell.source.trim() === "";
  const copy = finding && !isEmpty && (
    <CopyWord what="text" name={cell.name} write={() => navigator.clipboard.writeText(finding.resolved)} />
  );
  const actions = !isEmpty && !opened && (
    <>
      <LinkWord to={pages.cell(studyId, cell.id)}>
        Open <span className="sr-only">of {cell.name}</span>
      </LinkWord>
      {copy}
    </>
  );
  const problems = toldBesides(standing, finding);
  const shown = finding ? { ...standing, state: stateOf(standing, finding.quotations) } : standing;
  return (
    <>
      <StateLine
        standing={shown}
        beside={beside}
        actions={actions}
        {...(finding && !isEmpty && { detail: quotationsInWords(finding.quotations) })}
      />
      <WhereCellsAreProvider value={addresses}>
        {isEmpty ? (
          <NothingWritten readOnly={!onChange} />
        ) : !finding ? (
          <OnItsWay />
        ) : opened ? (
          <FindingOpen finding={finding} />
        ) : (
          <FindingBand finding={finding} />
        )}
      </WhereCellsAreProvider>
      {opened && <div className="no-print type-small mt-5">{copy}</div>}
      {problems.length > 0 && (
        <div className="mt-5">
          <ProblemList standing={{ ...standing, problems }} onMend={onChange} />
        </div>
      )}
    </>
  );
}

/** A number that is not there, or is out of date, is what the state line says, whoever noticed it. */
function stateOf({ state }: Standing, quotations: readonly QuotedNumber[]): Standing["state"] {
  if (quotations.some(({ standing }) => standing === "absent")) return "failed";
  return state === "current" && quotations.some(({ standing }) => standing === "out of date") ? "out of date" : state;
}

/** What is wrong beside the numbers that are not there, which say so themselves; and what could be put in their place. */
function toldBesides({ problems }: Standing, finding: TextFinding | undefined): Standing["problems"] {
  const absent = finding?.quotations.filter(({ standing }) => standing === "absent") ?? [];
  return problems.filter(({ place, nearest }) => {
    const isTold = place && absent.some(({ from, to }) => from <= place.from && place.from <= to);
    return nearest !== undefined || !isTold;
  });
}

function NothingWritten({ readOnly }: { readOnly: boolean }) {
  if (readOnly) return null;
  return (
    <p className="type-small max-w-[40rem] text-ink2">
      Write in Markdown, mathematics between $ signs. A brace begins a number quoted from another cell, such as{" "}
      <span className="type-source">{"{base: eta, grains}"}</span>: it follows its finding, and says so when that is out
      of date or gone.
    </p>
  );
}
