import type { Upload } from "../../../shared/schemas/resources.ts";
import { Word } from "../../components/button.tsx";

interface SameNameProps {
  readonly file: File;
  /** The latest first. */
  readonly versions: readonly Upload[];
  readonly onVersion: () => void;
  readonly onBeside: () => void;
  readonly onCancel: () => void;
}

/** An upload of the file's name is there: whether the file takes its place or stands beside it is for a person to say. */
export function SameName({ file, versions, onVersion, onBeside, onCancel }: SameNameProps) {
  const latest = versions[0].version;
  return (
    <fieldset aria-label={`${file.name} is there already`}>
      <p>
        There is a <b>{file.name}</b> already. As its version {latest + 1}, cells that read the latest version follow
        and version {latest} is kept; beside it, nothing else changes.
      </p>
      <p className="flex flex-wrap gap-x-5 pt-1.5">
        <Word onClick={onVersion}>Keep it as version {latest + 1}</Word>
        <Word onClick={onBeside}>Put it beside</Word>
        <Word quiet onClick={onCancel}>
          Leave it
        </Word>
      </p>
    </fieldset>
  );
}
