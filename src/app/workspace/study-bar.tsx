import { useMemo } from "react";
import { useNavigate } from "react-router-dom";
import { Button, LinkButton } from "../../components/button.tsx";
import { Menu } from "../../components/menu.tsx";
import { type Crumb, TopBar } from "../../components/top-bar.tsx";
import { PeoplePresent } from "../../features/presence/people-present.tsx";
import { presentPeople } from "../../features/presence/present.ts";
import { SavedState } from "../../features/presence/saved-state.tsx";
import { UndoneWords } from "../../features/presence/undone-words.tsx";
import { pages } from "../../lib/paths.ts";
import { useStudyPart } from "../../sync/index.ts";
import { useLeave } from "../use-leave.ts";
import type { OpenStudy } from "./open-study.ts";
import { useStudyKeys } from "./use-study-keys.ts";

export type StudyDialog =
  | "people"
  | "uploads"
  | "remarks"
  | "referee copies"
  | "replication bundle"
  | "journal"
  | "settings"
  | "keys"
  | "delete";

interface StudyBarProps extends OpenStudy {
  readonly crumbs: readonly Crumb[];
  readonly onDialog: (dialog: StudyDialog) => void;
  readonly children?: React.ReactNode;
}

/** The top bar of a study: who is here, whether everything is stored, what can be done. */
export function StudyBar({ study, me, connection, readOnly, crumbs, onDialog, children }: StudyBarProps) {
  const navigate = useNavigate();
  const leave = useLeave(me.id);
  const cells = useStudyPart(connection, "cells");
  const present = usePresent(connection);
  useStudyKeys(connection, () => onDialog("keys"));
  const isOwner = study.role === "owner";
  const entry = (key: StudyDialog, words: string) => ({ key, words, onSelect: () => onDialog(key) });
  return (
    <TopBar home={pages.studies} crumbs={crumbs} narrowName={study.title}>
      <PeoplePresent people={present} nameOfCell={(id) => cells.find((cell) => cell.id === id)?.name} />
      <UndoneWords study={connection} />
      <span className="mx-3">
        <SavedState study={connection} changedAt={study.changedAt} />
      </span>
      <LinkButton className="wide-only" to={pages.history(study.id)}>
        Checkpoints
      </LinkButton>
      {isOwner && (
        <Button className="wide-only" onClick={() => onDialog("referee copies")}>
          Seal a referee copy
        </Button>
      )}
      <Menu
        trigger="More"
        className="button"
        groups={[
          [
            { key: "studies", words: "Studies", onSelect: () => void navigate(pages.studies) },
            entry("people", "People"),
            entry("uploads", "Uploads"),
            entry("remarks", "Remarks"),
            {
              key: "history",
              words: "History and checkpoints",
              onSelect: () => void navigate(pages.history(study.id)),
            },
            ...(isOwner
              ? [entry("referee copies", "Referee copies"), entry("replication bundle", "Replication bundle")]
              : []),
            entry("journal", "Journal"),
          ],
          [entry("settings", "Settings"), entry("keys", "Keys"), { key: "leave", words: "Sign out", onSelect: leave }],
          isOwner && !readOnly ? [entry("delete", "Delete the study")] : [],
        ]}
      />
      {children}
    </TopBar>
  );
}

function usePresent(connection: OpenStudy["connection"]) {
  const people = useStudyPart(connection, "people");
  const whereabouts = useStudyPart(connection, "whereabouts");
  const you = useStudyPart(connection, "you");
  return useMemo(() => presentPeople(people, whereabouts, you), [people, whereabouts, you]);
}
