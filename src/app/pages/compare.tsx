import { useEffect, useState } from "react";
import { useNavigate, useParams } from "react-router-dom";
import type { SystemFinding, SystemSpecification } from "../../../shared/schemas/system.ts";
import { rowsApart } from "../../../shared/tables/compared.ts";
import { LinkButton, LinkWord } from "../../components/button.tsx";
import { useFinding } from "../../features/findings/api/get-finding.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { CoefficientsSection } from "../compare/coefficients-section.tsx";
import { CompareSide } from "../compare/compare-side.tsx";
import { ElasticitiesSection } from "../compare/elasticities-section.tsx";
import { FitSection } from "../compare/fit-section.tsx";
import { KeysSection } from "../compare/keys-section.tsx";
import { VerdictsSection } from "../compare/verdicts-section.tsx";
import { firstFindingShown } from "../workspace/first-finding.ts";
import { type OpenStudy, useOpenStudy } from "../workspace/open-study.ts";
import type { Standing } from "../workspace/standing.ts";
import { StudyBar, type StudyDialog } from "../workspace/study-bar.tsx";
import { StudyDialogs } from "../workspace/study-dialogs.tsx";
import { useEscape } from "../workspace/use-escape.ts";
import { useReading } from "../workspace/use-reading.ts";
import { useStandings } from "../workspace/use-standings.ts";

/** Two systems of a study side by side: the left page and the right one. */
export default function ComparePage() {
  const { leftId = "", rightId = "" } = useParams();
  const open = useOpenStudy();
  const { study } = open;
  const { standings, cells, uploads } = useStandings(open);
  const [dialog, setDialog] = useState<StudyDialog>();
  const navigate = useNavigate();
  const systems = standings.filter(({ kind }) => kind === "system");
  const left = systems.find(({ cell }) => cell.id === leftId);
  const right = systems.find(({ cell }) => cell.id === rightId);
  const specifications = useSpecifications(cells, uploads);
  usePageTitle(left && right && `${left.cell.name} and ${right.cell.name}`, study.title);
  useEffect(firstFindingShown, []);
  useEscape(() => void navigate(pages.study(study.id)));
  const crumbs = [
    { to: pages.studies, words: "Studies" },
    { to: pages.study(study.id), words: study.title },
  ];
  const choose = (side: "left" | "right", name: string) => {
    const id = systems.find(({ cell }) => cell.name === name)?.cell.id;
    if (id) void navigate(side === "left" ? pages.compare(study.id, id, rightId) : pages.compare(study.id, leftId, id));
  };
  return (
    <>
      <StudyBar {...open} crumbs={crumbs} onDialog={setDialog}>
        <LinkButton to={pages.study(study.id)}>Back to the study</LinkButton>
      </StudyBar>
      <main className="beside">
        {left && right ? (
          <>
            <h1 className="sr-only">
              {left.cell.name} and {right.cell.name} side by side
            </h1>
            <Comparison
              {...open}
              left={left}
              right={right}
              specifications={specifications}
              names={systems.map(({ cell }) => cell.name)}
              onChoose={choose}
            />
          </>
        ) : (
          <p className="type-finding mx-auto max-w-2xl px-6 py-16">
            {left || right ? "The other system" : "Neither of these systems"} is not in the study any more. Go{" "}
            <LinkWord to={pages.study(study.id)}>back to the study</LinkWord>.
          </p>
        )}
      </main>
      <StudyDialogs {...open} standings={standings} open={dialog} onClose={() => setDialog(undefined)} />
    </>
  );
}

interface ComparisonProps extends OpenStudy {
  readonly left: Standing;
  readonly right: Standing;
  readonly specifications: ReadonlyMap<string, SystemSpecification>;
  readonly names: readonly string[];
  readonly onChoose: (side: "left" | "right", name: string) => void;
}

function Comparison({ study, connection, readOnly, left, right, specifications, names, onChoose }: ComparisonProps) {
  const ours = useSystemFinding(study.id, left);
  const theirs = useSystemFinding(study.id, right);
  const called = [left.cell.name, right.cell.name] as const;
  const [asked, askedThere] = [specifications.get(left.cell.id), specifications.get(right.cell.id)];
  const side = (which: "left" | "right", standing: Standing, finding: SystemFinding | undefined) => (
    <CompareSide
      side={which}
      studyId={study.id}
      standing={standing}
      others={names.filter((name) => name !== (which === "left" ? called[1] : called[0]))}
      onChoose={(name) => onChoose(which, name)}
      finding={finding}
      onChange={readOnly ? undefined : (next) => connection.replaceSource(standing.cell.id, next)}
    />
  );
  const both = ours && theirs && asked && askedThere;
  const one = both && { name: called[0], specification: asked, finding: ours };
  const other = both && { name: called[1], specification: askedThere, finding: theirs };
  const warning = one && other && rowsApart(one, other);
  return (
    <>
      <div className="beside-section">
        {side("left", left, ours)}
        {side("right", right, theirs)}
      </div>
      {warning && (
        <div className="beside-section">
          <p className="beside-wide type-finding text-stale">{warning}</p>
        </div>
      )}
      {asked && askedThere && <KeysSection left={asked} right={askedThere} names={called} />}
      {one && other ? (
        <>
          <VerdictsSection left={one.finding} right={other.finding} names={called} />
          <FitSection left={one} right={other} />
          <ElasticitiesSection left={one} right={other} />
          <CoefficientsSection left={one} right={other} />
        </>
      ) : (
        <div className="beside-section">
          <p className="beside-wide type-finding">{waitingWords([left, right])}</p>
        </div>
      )}
    </>
  );
}

/** Why no numbers are set beside each other yet. */
function waitingWords(sides: readonly Standing[]): string {
  const without = sides.filter(({ fingerprint }) => !fingerprint);
  if (without.length === 0) return "The findings are being fetched.";
  const said = without.map(({ cell, state }) => `${cell.name} is ${state === "draft" ? "a draft" : state}`);
  return `Numbers are set beside each other once both systems are current: ${said.join(", and ")}.`;
}

/** The finding that answers a system as it stands. */
function useSystemFinding(studyId: string, { fingerprint }: Standing): SystemFinding | undefined {
  const { data } = useFinding(studyId, fingerprint);
  return fingerprint && data?.finding.kind === "system" ? data.finding : undefined;
}

/** What every sound system cell asks, with what it takes over from others. */
function useSpecifications(
  cells: ReturnType<typeof useStandings>["cells"],
  uploads: ReturnType<typeof useStandings>["uploads"],
): ReadonlyMap<string, SystemSpecification> {
  const reading = useReading(true);
  const resolved = reading ? reading.resolveHere(cells, uploads) : [];
  return new Map(
    resolved.flatMap(({ id, specification }) =>
      specification?.kind === "system" ? [[id, specification] as const] : [],
    ),
  );
}
