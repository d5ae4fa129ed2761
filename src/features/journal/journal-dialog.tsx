import { Dialog } from "../../components/dialog.tsx";
import { JournalList } from "./journal-list.tsx";

/** What was done in a study, apart from what was written in its cells. */
export default function JournalDialog({ studyId, onClose }: { studyId: string; onClose: () => void }) {
  return (
    <Dialog
      onClose={onClose}
      title="Journal"
      lede="Who came and went, what was uploaded, sealed and returned to. It is added to and never changed."
    >
      <JournalList studyId={studyId} />
    </Dialog>
  );
}
