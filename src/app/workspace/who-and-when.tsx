import { useMe } from "../../features/accounts/api/get-me.ts";
import { WhoAndWhen } from "../../features/history/who-and-when.tsx";
import type { Standing } from "./standing.ts";

interface OutOfDateByProps {
  readonly studyId: string;
  readonly standing: Standing;
  readonly last: NonNullable<Standing["last"]>;
}

/** Who changed what a finding answered: the cell itself, or the latest of those it reads. */
export default function OutOfDateBy({ studyId, standing, last }: OutOfDateByProps) {
  const { data: me } = useMe();
  const { cell, because = "", reads } = standing;
  return (
    <WhoAndWhen
      studyId={studyId}
      you={me?.id}
      cellId={cell.id}
      isOwnChange={last.source !== cell.source}
      reads={reads}
      foundAt={last.at}
      what={because}
    />
  );
}
