import { asChoices, ChoiceField } from "../form/fields.tsx";
import { NumberField } from "../form/number-field.tsx";
import type { PartProps } from "./section.tsx";

const KEY = "standard errors";

const KINDS = [
  { value: "conventional", label: "conventional" },
  { value: "heteroskedastic", label: "robust to heteroskedasticity" },
  { value: "cluster", label: "clustered" },
  { value: "bootstrap", label: "by bootstrap" },
];

const DRAWN = [
  { value: "rows", label: "rows" },
  { value: "clusters", label: "clusters of rows" },
  { value: "residuals", label: "residuals" },
  { value: "blocks", label: "blocks of periods" },
];

/** How standard errors are computed, and what each way asks besides. */
export function ErrorFields({ columns, ...part }: PartProps & { columns: readonly string[] }) {
  const { written, readOnly } = part;
  const says = (key: string) => written.value(KEY, key) !== undefined;
  const kind = says("bootstrap") ? "bootstrap" : says("cluster") ? "cluster" : written.text(KEY) || "conventional";
  const choose = (next: string) => {
    if (next === "conventional") written.write([[KEY], undefined]);
    else if (next === "cluster") written.write([[KEY], { cluster: columns[0] ?? "" }]);
    else if (next === "bootstrap") written.write([[KEY], { bootstrap: "rows", replicates: 500, seed: 1 }]);
    else written.write([[KEY], next]);
  };
  return (
    <>
      <ChoiceField label="Standard errors" value={kind} choices={KINDS} readOnly={readOnly} onChange={choose} />
      {kind === "cluster" && (
        <ChoiceField
          label="Cluster"
          value={written.text(KEY, "cluster")}
          choices={asChoices(columns)}
          mono
          readOnly={readOnly}
          onChange={(value) => written.write([[KEY, "cluster"], value])}
        />
      )}
      {kind === "bootstrap" && <BootstrapFields columns={columns} {...part} />}
    </>
  );
}

function BootstrapFields({ columns, ...part }: PartProps & { columns: readonly string[] }) {
  const { written, readOnly } = part;
  const of = written.text(KEY, "bootstrap");
  const choose = (value: string) =>
    written.write(
      [[KEY, "bootstrap"], value],
      ...(value === "blocks" ? [] : [[[KEY, "block"], undefined] as const]),
      ...(value === "clusters" ? [] : [[[KEY, "cluster"], undefined] as const]),
    );
  return (
    <>
      <ChoiceField label="Drawn again" value={of} choices={DRAWN} readOnly={readOnly} onChange={choose} />
      {of === "clusters" && (
        <ChoiceField
          label="Cluster"
          value={written.text(KEY, "cluster")}
          choices={asChoices(columns)}
          none="that of the data"
          mono
          readOnly={readOnly}
          onChange={(value) => written.write([[KEY, "cluster"], value || undefined])}
        />
      )}
      {of === "blocks" && (
        <>
          <NumberField
            label="Block, periods"
            path={[KEY, "block"]}
            otherwise={readOnly ? "by the number of rows" : ""}
            {...part}
          />
          {!readOnly && written.text(KEY, "block") === "" && (
            <p className="type-small pb-1 text-ink2">Left empty, the number of rows decides.</p>
          )}
        </>
      )}
      <NumberField label="Replicates" path={[KEY, "replicates"]} otherwise="500" {...part} />
      <NumberField label="Seed" path={[KEY, "seed"]} otherwise="1" {...part} />
    </>
  );
}
