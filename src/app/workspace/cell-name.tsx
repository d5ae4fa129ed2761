import { type KeyboardEvent, useId, useState } from "react";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Fault } from "../../components/field.tsx";
import { commandOf } from "../../lib/keys.ts";
import { nameFault } from "./name-fault.ts";

interface CellNameProps {
  readonly cell: CellSource;
  readonly cells: readonly CellSource[];
  readonly headingId: string;
  readonly renaming: boolean;
  readonly onRename: (name: string) => void;
  readonly onDone: () => void;
  readonly title?: boolean;
  /** Whether the cell can be put elsewhere by dragging its name. */
  readonly isDraggable?: boolean;
}

/** Name and kind. While renaming, the name is a field in its own place and type. */
export function CellName({
  cell,
  cells,
  headingId,
  renaming,
  onRename,
  onDone,
  title = false,
  isDraggable,
}: CellNameProps) {
  const Heading = title ? "h1" : "h2";
  const type = title ? "type-title" : "type-cell-name";
  return (
    <div
      className={`min-w-0 ${isDraggable ? "cursor-grab active:cursor-grabbing" : ""}`}
      {...(isDraggable && !renaming && { draggable: true, "data-drag": true })}
    >
      <Heading id={headingId} data-stop className={`${type} min-w-0 break-words`}>
        {renaming ? (
          <NameField cell={cell} cells={cells} onRename={onRename} onDone={onDone} />
        ) : (
          <>
            {cell.name || "without a name"}{" "}
            <span className="type-kind ml-0.5 font-normal tracking-normal">{cell.kind}</span>
          </>
        )}
      </Heading>
    </div>
  );
}

function NameField({ cell, cells, onRename, onDone }: Pick<CellNameProps, "cell" | "cells" | "onRename" | "onDone">) {
  const id = useId();
  const [name, setName] = useState(cell.name);
  const fault = nameFault(name.trim(), cell, cells);
  const commit = () => {
    if (!fault && name.trim() !== cell.name) onRename(name.trim());
    onDone();
  };
  const onKeyDown = (event: KeyboardEvent) => {
    event.stopPropagation();
    const command = commandOf("field", event);
    if (command === "write" && !fault) commit();
    if (command === "giveUp") onDone();
  };
  return (
    <>
      <input
        // biome-ignore lint/a11y/noAutofocus: the person has just asked to write here
        autoFocus
        aria-label={`Name of ${cell.name}`}
        aria-invalid={fault ? true : undefined}
        aria-describedby={fault ? id : undefined}
        className="field-line font-inherit!"
        value={name}
        onChange={(event) => setName(event.target.value)}
        onFocus={(event) => event.target.select()}
        onBlur={commit}
        onKeyDown={onKeyDown}
      />
      {fault && <Fault id={id}>{fault}</Fault>}
    </>
  );
}
