import { useState } from "react";
import { FormRow, TextControl } from "../form/fields.tsx";
import type { Written } from "../form/written.ts";

/** Columns derived from others: a name and an expression each. */
export function DerivedFields({ written, readOnly }: { written: Written; readOnly: boolean }) {
  const [name, setName] = useState("");
  const derived = Object.keys(written.map("derive"));
  if (readOnly && derived.length === 0) return null;
  return (
    <FormRow label="Derive">
      {derived.map((column) => (
        <div key={column} className="flex items-baseline gap-2">
          <span className="shrink-0 font-mono text-[0.8125rem]/[1.375rem]">{column} =</span>
          <TextControl
            aria-label={`Expression of ${column}`}
            value={written.text("derive", column)}
            mono
            readOnly={readOnly}
            // An emptied expression takes the column with it.
            onCommit={(text) => written.write([["derive", column], text === "" ? undefined : text])}
          />
        </div>
      ))}
      {!readOnly && (
        <div className="flex items-baseline gap-2">
          <input
            type="text"
            aria-label="Name of a column to derive"
            value={name}
            spellCheck={false}
            autoComplete="off"
            onChange={(event) => setName(event.target.value.replace(/\s/g, "_"))}
            className="min-h-6 w-24 shrink-0 border-ctl border-b bg-transparent font-mono text-[0.8125rem]/[1.375rem] max-[599px]:min-h-11"
          />
          {name === "" ? (
            <span className="type-small text-ink2">names a new column</span>
          ) : (
            <>
              <span aria-hidden="true">=</span>
              <TextControl
                aria-label={`Expression of ${name}`}
                value=""
                mono
                readOnly={false}
                onCommit={(text) => {
                  if (text === "") return;
                  written.write([["derive", name], text]);
                  setName("");
                }}
              />
            </>
          )}
        </div>
      )}
    </FormRow>
  );
}
