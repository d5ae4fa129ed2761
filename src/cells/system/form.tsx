import { ESTIMATOR_NAMES } from "../../../shared/schemas/system.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { uploadRead } from "../../../shared/study/uploads.ts";
import { listWords } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { RESTRICTION_NAMES, SYSTEM_NAMES, type SystemName } from "../../../shared/systems/names.ts";
import { CellField } from "../form/cell-field.tsx";
import { CheckGroup } from "../form/choices.tsx";
import { DefaultField } from "../form/default-field.tsx";
import { asChoices, ChoiceField, FormRow, TextField, Unreadable } from "../form/fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { CurvatureFields } from "./curvature-fields.tsx";
import { ErrorFields } from "./error-fields.tsx";
import { OWN_KEYS, OwnFields } from "./own-fields.tsx";
import { StepFields } from "./step-fields.tsx";
import { TimeFields } from "./time-fields.tsx";

const FORMS = SYSTEM_NAMES.map((name) => ({ value: name, label: SYSTEMS[name].longName }));
/** Forms whose curvature can be imposed at a point. */
const CURVED: readonly string[] = ["la-aids", "aids", "quaids"];
const isSystem = (word: string): word is SystemName => (SYSTEM_NAMES as readonly string[]).includes(word);

const isMap = (value: unknown): value is Record<string, unknown> => typeof value === "object" && value !== null;

/** What the data cell a system names has to offer: its goods, and the columns that may shift the intercepts. */
function offered({ cells, uploads }: FormProps["context"], dataName: string) {
  const cell = cells.find((one) => one.kind === "data" && one.name === dataName);
  const written = cell ? parseCell("data", cell.source).written : {};
  const upload = uploadRead(uploads, written);
  const numeric = upload?.columns.filter((column) => column.type === "number").map((column) => column.name) ?? [];
  const goods: Record<string, unknown> = isMap(written.goods) ? written.goods : {};
  // What makes shares and prices, or weighs the rows, does not shift their intercepts too.
  const taken = new Set([
    ...Object.values(goods).flatMap((mapping) => (isMap(mapping) ? Object.values(mapping) : [])),
    written.weight,
    written.cluster,
    written.total,
  ]);
  const derived = isMap(written.derive) ? Object.keys(written.derive) : [];
  const names = upload?.columns.map((column) => column.name) ?? [];
  return {
    goods: Object.keys(goods),
    columns: [...derived, ...numeric].filter((name) => !taken.has(name)),
    // Any column may say which rows were sampled together; the data's own comes first.
    all: [...new Set([...(typeof written.cluster === "string" ? [written.cluster] : []), ...names])],
  };
}

/** A system cell as a form: form, restrictions, estimator and what shifts the intercepts. */
export function SystemForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("system", props);
  if (!written.readable) return <Unreadable />;
  const form = written.text("form");
  const { goods, columns, all } = offered(context, written.text("data"));
  const takesDemographics = !isSystem(form) || SYSTEMS[form].takesDemographics;
  const part = { written, readOnly };
  const says = (key: string) => written.value(key) !== undefined;
  const chooseForm = (next: string) => {
    // What belongs to the last form alone goes when that does.
    const leaving = (OWN_KEYS[form] ?? []).filter((key) => !(OWN_KEYS[next] ?? []).includes(key));
    written.write([["form"], next], ...leaving.map((key) => [[key], undefined] as const));
  };
  return (
    <div>
      <CellField kind="data" {...part} context={context} />
      <ChoiceField label="Form" value={form} choices={FORMS} readOnly={readOnly} onChange={chooseForm} />
      <OwnFields form={form} {...part} />
      {takesDemographics && (
        <CheckGroup
          legend="Demographics"
          values={written.list("demographics")}
          choices={asChoices(columns)}
          mono
          readOnly={readOnly}
          onChange={(values) => written.write([["demographics"], values.length > 0 ? values : undefined])}
        />
      )}
      <Impose form={form} {...part} />
      <DefaultField
        label="Estimator"
        path={["estimator"]}
        otherwise="maximum likelihood"
        choices={asChoices(ESTIMATOR_NAMES)}
        {...part}
      />
      <ErrorFields {...part} columns={all} />
      <ChoiceField
        label="Dropped"
        value={written.text("dropped")}
        choices={asChoices(goods)}
        none="the last good"
        readOnly={readOnly}
        onChange={(value) => written.write([["dropped"], value || undefined])}
      />
      <TextField
        label="Conditional on"
        value={written.text("conditional on")}
        readOnly={readOnly}
        onCommit={(value) => written.write([["conditional on"], value.trim() || undefined])}
      />
      <TimeFields {...part} form={form} />
      {(form !== "rotterdam" || says("instruments") || says("zeros")) && <StepFields {...part} columns={columns} />}
      {(CURVED.includes(form) || says("curvature")) && <CurvatureFields {...part} />}
    </div>
  );
}

/** Restrictions to impose; a form that holds them by itself leaves none to choose. */
function Impose({ form, written, readOnly }: { form: string; written: Written; readOnly: boolean }) {
  const held = isSystem(form) ? SYSTEMS[form].heldByForm : [];
  const open = RESTRICTION_NAMES.filter((name) => !held.includes(name));
  const imposed = written.list("impose");
  if (open.length === 0 && imposed.length === 0) {
    return (
      <FormRow label="Impose">
        <span className="text-[0.875rem]/[1.25rem]">{listWords(held)} hold by the form itself</span>
      </FormRow>
    );
  }
  return (
    <CheckGroup
      legend="Impose"
      values={imposed}
      choices={asChoices(RESTRICTION_NAMES)}
      readOnly={readOnly}
      onChange={(values) => written.write([["impose"], values])}
    />
  );
}
