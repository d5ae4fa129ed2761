import { useQueries } from "@tanstack/react-query";
import { useDeferredValue, useMemo, useRef } from "react";
import type { TextFinding } from "../../../shared/schemas/text.ts";
import { askedNumbers } from "../../../shared/study/asked-numbers.ts";
import { quotedCells } from "../../../shared/study/quotations.ts";
import { type QuotedCell, textFinding } from "../../../shared/tables/text-finding.ts";
import { findingOptions } from "../../features/findings/api/get-finding.ts";
import { whenInWords } from "../../lib/dates.ts";
import { useAllStandings } from "./all-standings.ts";
import type { Standing } from "./standing.ts";

/** The finding a quoted cell has to show: that of its question as it stands, else the last it had. */
const shownOf = (standing: Standing | undefined): string | undefined =>
  standing?.fingerprint ?? standing?.last?.fingerprint;

/**
 * A text cell's finding, made here as the text is written: every number from the finding of its cell, and what that
 * cell is now. Until all of them are here it is the one before, or none.
 */
export function useTextFinding(studyId: string, { cell }: Standing): TextFinding | undefined {
  const standings = useAllStandings();
  // Whoever types does not wait for the text to be drawn.
  const source = useDeferredValue(cell.source);
  const quoted = useMemo(() => {
    const byName = new Map(standings.map((one) => [one.cell.name, one]));
    return quotedCells(source).map((name) => ({ name, standing: byName.get(name) }));
  }, [source, standings]);
  const asked = quoted.filter(({ standing }) => shownOf(standing) !== undefined);
  const answers = useQueries({
    queries: asked.map(({ standing }) => findingOptions(studyId, shownOf(standing) ?? "")),
    combine: (results) => results.map(({ data, isError, isPending }) => ({ data, isError, isPending })),
  });
  const isWaiting = answers.some(({ isPending }) => isPending) || quoted.some(({ standing }) => standing?.isUnread);
  const last = useRef<TextFinding>(undefined);
  const finding = useMemo(() => {
    if (isWaiting) return undefined;
    const told = new Map(
      quoted.map(({ name, standing }) => {
        const answer = answers[asked.findIndex((one) => one.name === name)];
        return [name, quotedCell(name, standing, answer)] as const;
      }),
    );
    const kindOf = (name: string) => quoted.find((one) => one.name === name)?.standing?.kind;
    const noCell = (name: string): QuotedCell => ({ standing: "absent", because: `No cell is called ${name}.` });
    return textFinding(source, askedNumbers(source, kindOf), (name) => told.get(name) ?? noCell(name));
  }, [isWaiting, source, quoted, asked, answers]);
  if (finding) last.current = finding;
  return finding ?? last.current;
}

type Answer = { readonly data?: { readonly finding: Extract<QuotedCell, { finding: unknown }>["finding"] } };

function quotedCell(name: string, standing: Standing | undefined, answer: Answer | undefined): QuotedCell {
  if (!standing) return { standing: "absent", because: `No cell is called ${name}.` };
  const { fingerprint, state, because, last } = standing;
  const finding = answer?.data?.finding;
  const why = because ? `: ${because}` : "";
  if (!finding) {
    const none = answer ? "could not be fetched" : state === "failed" ? `failed${why}` : "has no finding yet";
    return { standing: "absent", because: `${name} ${none}.` };
  }
  if (fingerprint) return { standing: "current", finding, fingerprint };
  const now =
    state === "estimating" ? "is being estimated anew" : state === "failed" ? `has failed since${why}` : because;
  const found = last ? `found ${whenInWords(last.at)}` : "found before";
  return {
    standing: "out of date",
    finding,
    ...(last && { fingerprint: last.fingerprint }),
    because: now ? `${found}, and since then ${now}` : found,
  };
}
