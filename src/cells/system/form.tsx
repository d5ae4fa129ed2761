import { ESTIMATOR_NAMES } from "../../../shared/schemas/system.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { listWords } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { PRICE_INDEX_NAMES, RESTRICTION_NAMES, SYSTEM_NAMES, type SystemName } from "../../../shared/systems/names.ts";
import { CheckGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField, FormRow, TextField, Unreadable } from "../form/fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";

const FORMS = SYSTEM_NAMES.map((name) => ({ value: name, label: SYSTEMS[name].longName }));
const isSystem = (word: string): word is SystemName => (SYSTEM_NAMES as readonly string[]).includes(word);

const isMap = (value: unknown): value is Record<string, unknown> => typeof value === "object" && value !== null;

/** What the data cell a system names has to offer: its goods, and the columns that may shift the intercepts. */
function offered({ cells, uploads }: FormProps["context"], dataName: string) {
  const cell = cells.find((one) => one.kind === "data" && one.name === dataName);
  const written = cell ? parseCell("data", cell.source).written : {};
  const upload = uploads.find((one) => one.name === written.upload);
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
  return { goods: Object.keys(goods), columns: [...derived, ...numeric].filter((name) => !taken.has(name)) };
}

/** A system cell as a form: form, restrictions, estimator and what shifts the intercepts. */
export function SystemForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("system", props);
  if (!written.readable) return <Unreadable />;
  const form = written.text("form");
  const { goods, columns } = offered(context, written.text("data"));
  const data = context.cells.filter((cell) => cell.kind === "data").map((cell) => cell.name);
  const takesDemographics = !isSystem(form) || SYSTEMS[form].takesDemographics;
  const chooseForm = (next: string) =>
    // An index belongs to la-aids alone: it goes when the form does.
    written.write([["form"], next], ...(next === "la-aids" ? [] : [[["index"], undefined] as const]));
  return (
    <div>
      <ChoiceField
        label="Data"
        value={written.text("data")}
        choices={asChoices(data)}
        readOnly={readOnly}
        onChange={(value) => written.write([["data"], value])}
      />
      <ChoiceField label="Form" value={form} choices={FORMS} readOnly={readOnly} onChange={chooseForm} />
      {form === "la-aids" && (
        <ChoiceField
          label="Index"
          value={written.text("index")}
          choices={asChoices(PRICE_INDEX_NAMES)}
          none="tornqvist"
          readOnly={readOnly}
          onChange={(value) => written.write([["index"], value || undefined])}
        />
      )}
      <Impose form={form} written={written} readOnly={readOnly} />
      <ChoiceField
        label="Estimator"
        value={written.text("estimator")}
        choices={asChoices(ESTIMATOR_NAMES)}
        none="maximum likelihood"
        readOnly={readOnly}
        onChange={(value) => written.write([["estimator"], value || undefined])}
      />
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
      {form === "aids" && <AlphaNought written={written} readOnly={readOnly} />}
      <ChoiceField
        label="Dropped"
        value={written.text("dropped")}
        choices={asChoices(goods)}
        none="the last good"
        readOnly={readOnly}
        onChange={(value) => written.write([["dropped"], value || undefined])}
      />
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

function AlphaNought({ written, readOnly }: { written: Written; readOnly: boolean }) {
  return (
    <TextField
      label="α₀, held fixed"
      value={written.text("alpha0") || (readOnly ? "0" : "")}
      numeric
      readOnly={readOnly}
      onCommit={(value) => written.write([["alpha0"], value === "" ? undefined : asNumber(value)])}
    />
  );
}

/** A number where one was typed; anything else is written as it is, for the text to mark. */
function asNumber(text: string): number | string {
  const number = Number(text.replace("\u2212", "-"));
  return Number.isFinite(number) ? number : text;
}
