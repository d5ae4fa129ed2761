import type { Upload } from "../../../shared/schemas/resources.ts";
import { latestUploads, uploadRead, versionOf, versionsOf } from "../../../shared/study/uploads.ts";
import { counted } from "../../../shared/study/words.ts";
import { asChoices, type Choice, ChoiceField, TextField, Unreadable } from "../form/fields.tsx";
import { readWritten } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { columnChoices } from "./column-choices.ts";
import { ColumnField } from "./column-chooser.tsx";
import { DerivedFields } from "./derived-fields.tsx";
import { goodsInWords, mappingOf } from "./goods-mapping.ts";
import { GoodsTable } from "./goods-table.tsx";

function versionChoice(upload: Upload): Choice {
  const version = String(upload.version);
  return {
    value: version,
    label: `${version}: ${counted(upload.rows, "row")}, by ${upload.uploadedBy}`,
    chosen: version,
  };
}

const ROLES = [
  ["total", "Total", "the sum of the goods", true],
  ["weight", "Weight", "none", true],
  ["cluster", "Cluster", "none", false],
  ["time", "Time", "none", false],
] as const;

/** A data cell as a form: which upload, which columns are what, which rows are kept. */
export function DataForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("data", props);
  if (!written.readable) return <Unreadable />;
  const named = { upload: written.text("upload"), version: written.value("version") };
  const upload = uploadRead(context.uploads, named);
  const versions = versionsOf(context.uploads, named.upload);
  const derived = Object.keys(written.map("derive"));
  const goods = Object.keys(written.map("goods")).map((good) => mappingOf(written, good));
  return (
    <div>
      <ChoiceField
        label="Upload"
        value={written.text("upload")}
        choices={asChoices(latestUploads(context.uploads).map((one) => one.name))}
        readOnly={readOnly}
        // Versions are counted within a name: a pin means nothing for another.
        onChange={(value) => written.write([["upload"], value], [["version"], undefined])}
      />
      {(versions.length > 1 || named.version !== undefined) && (
        <ChoiceField
          label="Version"
          value={written.text("version")}
          choices={versions.map((one) => versionChoice(one))}
          none={versions.length > 0 ? `the latest, ${versionOf(versions[0])}` : "the latest"}
          readOnly={readOnly}
          onChange={(value) => written.write([["version"], value === "" ? undefined : Number(value)])}
        />
      )}
      <details open={goods.length === 0} className="py-1">
        <summary className="min-h-6 cursor-pointer text-[0.875rem]/[1.25rem]">
          <span className="text-ink2">Goods:</span> {goodsInWords(goods)}
        </summary>
        <GoodsTable form={props} />
      </details>
      {ROLES.map(([key, label, none, numbersOnly]) => (
        <ColumnField
          key={key}
          label={label}
          value={written.text(key)}
          choices={columnChoices(upload, derived, numbersOnly)}
          none={none}
          readOnly={readOnly}
          onChange={(value) => written.write([[key], value || undefined])}
        />
      ))}
      <DerivedFields written={written} readOnly={readOnly} />
      <TextField
        label="Keep"
        value={written.text("keep")}
        mono
        readOnly={readOnly}
        onCommit={(value) => written.write([["keep"], value || undefined])}
      />
      <ChoiceField
        label="Normalise"
        value={written.text("normalise") || "mean"}
        choices={[
          { value: "mean", label: "prices and total to their weighted means" },
          { value: "none", label: "nothing: units as uploaded" },
        ]}
        readOnly={readOnly}
        onChange={(value) => written.write([["normalise"], value])}
      />
    </div>
  );
}
