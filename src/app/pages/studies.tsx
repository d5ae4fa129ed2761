import { lazy, useState } from "react";
import { Link, useNavigate } from "react-router-dom";
import { Button, LinkWord } from "../../components/button.tsx";
import { TopBar } from "../../components/top-bar.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { useInstallation } from "../../features/accounts/api/get-installation.ts";
import { useMe } from "../../features/accounts/api/get-me.ts";
import { InvitationsForYou } from "../../features/people/invitations-for-you.tsx";
import { useDeletedStudies } from "../../features/studies/api/deleted-studies.ts";
import { useStudies } from "../../features/studies/api/list-studies.ts";
import { DeletedList } from "../../features/studies/deleted-list.tsx";
import { type StudyFilter, shownStudies } from "../../features/studies/study-filters.ts";
import { StudyFinder } from "../../features/studies/study-finder.tsx";
import { StudyList } from "../../features/studies/study-list.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { installationInWords } from "../installation-words.ts";
import { LaidOver } from "../laid-over.tsx";
import { useLeave } from "../use-leave.ts";

const NewStudyDialog = lazy(() => import("../../features/studies/new-study-dialog.tsx"));
const SettingsDialog = lazy(() => import("../settings-dialog.tsx"));

export default function StudiesPage() {
  const { data: me } = useMe();
  const { data: studies, error, refetch } = useStudies();
  const { data: deleted = [] } = useDeletedStudies();
  const { data: installation } = useInstallation();
  const [filter, setFilter] = useState<StudyFilter>("all");
  const [find, setFind] = useState("");
  const [dialog, setDialog] = useState<"new study" | "settings">();
  const navigate = useNavigate();
  const leave = useLeave(me?.id);
  usePageTitle("Studies");
  const close = () => setDialog(undefined);
  return (
    <>
      <TopBar home={pages.studies}>
        <Link to={pages.account} className="you mr-4 font-semibold text-ink no-underline hover:text-accent">
          {me?.name} <span className="sr-only">, your account</span>
        </Link>
        <Button onClick={() => setDialog("settings")}>Settings</Button>
        <Button onClick={leave}>Sign out</Button>
      </TopBar>
      <main className="studies">
        <div className="studies-left">
          <h1 className="type-display">Studies</h1>
          <p className="type-finding pt-2 pb-5 lg:pb-9">{installation && installationInWords(installation.name)}</p>
          <StudyFinder
            studies={studies ?? []}
            deleted={deleted.length}
            filter={filter}
            find={find}
            onFilter={setFilter}
            onFind={setFind}
          />
          <div className="pt-6 lg:pt-9">
            <Button filled onClick={() => setDialog("new study")}>
              New study
            </Button>
            {me?.isAdministrator && (
              <LinkWord quiet to={pages.administration} className="ml-5">
                Administration
              </LinkWord>
            )}
          </div>
        </div>
        <div className="studies-right">
          {error && !studies && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
          <InvitationsForYou />
          {filter === "deleted" && <DeletedList studies={deleted} />}
          {filter !== "deleted" && studies && me && (
            <StudyList studies={shownStudies(studies, filter, find)} you={me.id} hidden={studies.length > 0} />
          )}
          {!studies && !error && <p role="status">Fetching the studies</p>}
        </div>
      </main>
      {dialog && (
        <LaidOver key={dialog} onClose={close}>
          {dialog === "new study" ? (
            <NewStudyDialog onClose={close} onCreated={(studyId) => navigate(pages.study(studyId))} />
          ) : (
            <SettingsDialog onClose={close} />
          )}
        </LaidOver>
      )}
    </>
  );
}
