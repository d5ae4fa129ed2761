import { BOOTSTRAP_NAMES } from "../../../shared/schemas/standard-errors.ts";
import { RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField } from "../form/fields.tsx";
import { NumberField } from "../form/number-field.tsx";
import type { PartProps } from "./section.tsx";

const KEY = "standard errors";

/** How standard errors are computed, and what each way asks besides. */
export function ErrorFields({ written, readOnly, columns }: PartProps & { columns: readonly string[] }) {
  const kind =
    written.value(KEY, "bootstrap") !== undefined
      ? "bootstrap"
      : written.value(KEY, "cluster") !== undefined
        ? "cluster"
        : written.text(KEY) || "conventional";
  const choose = (next: string) => {
    if (next === "conventional") written.write([[KEY], undefined]);
    else if (next === "cluster") written.write([[KEY], { cluster: columns[0] ?? "" }]);
    else if (next === "bootstrap") written.write([[KEY], { bootstrap: "rows", replicates: 500, seed: 1 }]);
    else written.write([[KEY], next]);
  };
  return (
    <RadioGroup
      legend="Standard errors"
      value={kind}
      readOnly={readOnly}
      onChange={choose}
      choices={[
        { value: "conventional", label: "conventional" },
        { value: "heteroskedastic", label: "robust to heteroskedasticity" },
        {
          value: "cluster",
          label: "by cluster",
          below: (
            <ChoiceField
              label="Cluster"
              value={written.text(KEY, "cluster")}
              choices={asChoices(columns)}
              mono
              readOnly={readOnly}
              onChange={(value) => written.write([[KEY, "cluster"], value])}
            />
          ),
        },
        {
          value: "bootstrap",
          label: "by bootstrap",
          below: <BootstrapFields written={written} readOnly={readOnly} columns={columns} />,
        },
      ]}
    />
  );
}

function BootstrapFields({ written, readOnly, columns }: PartProps & { columns: readonly string[] }) {
  const of = written.text(KEY, "bootstrap");
  const number = (key: "replicates" | "seed" | "block", label: string, otherwise: string) => (
    <NumberField
      label={label}
      path={[KEY, key]}
      written={written}
      readOnly={readOnly}
      otherwise={readOnly ? otherwise : ""}
    />
  );
  const choose = (value: string) =>
    written.write(
      [[KEY, "bootstrap"], value],
      ...(value === "blocks" ? [] : [[[KEY, "block"], undefined] as const]),
      ...(value === "clusters" ? [] : [[[KEY, "cluster"], undefined] as const]),
    );
  return (
    <>
      <ChoiceField label="Of" value={of} choices={asChoices(BOOTSTRAP_NAMES)} readOnly={readOnly} onChange={choose} />
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
      {of === "blocks" && number("block", "Block, periods", "by the number of rows")}
      {number("replicates", "Replicates", "500")}
      {number("seed", "Seed", "1")}
    </>
  );
}
