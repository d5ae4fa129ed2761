import { useNavigate } from "react-router-dom";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { useRemarkSetting } from "../../features/remarks/remark-setting.ts";
import RemarksDialog from "../../features/remarks/remarks-dialog.tsx";
import { pages } from "../../lib/paths.ts";
import { focusBand } from "./addresses.ts";
import type { OpenStudy } from "./open-study.ts";

interface StudyRemarksProps extends Omit<OpenStudy, "readOnly"> {
  readonly onClose: () => void;
}

/** Every remark of the study, each leading to its cell. */
export default function StudyRemarks({ study, me, connection, onClose }: StudyRemarksProps) {
  const setting = useRemarkSetting(study.id, me, connection);
  const navigate = useNavigate();
  const go = async ({ cellId }: Remark) => {
    onClose();
    await navigate(pages.study(study.id));
    // Once the page is there, and the focus no longer the dialog's.
    setTimeout(focusBand, 60, cellId);
  };
  return <RemarksDialog setting={setting} onClose={onClose} onGo={(remark) => void go(remark)} />;
}
