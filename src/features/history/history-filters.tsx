import { useId } from "react";
import type { HistoryFilter } from "./api/get-history.ts";

interface Choice {
  readonly id: string;
  readonly name: string;
}

interface HistoryFiltersProps {
  readonly filter: HistoryFilter;
  readonly cells: readonly Choice[];
  readonly people: readonly Choice[];
  readonly onFilter: (filter: HistoryFilter) => void;
}

/** In which cell, and by whom. */
export function HistoryFilters({ filter, cells, people, onFilter }: HistoryFiltersProps) {
  return (
    <div className="flex flex-wrap gap-x-6 gap-y-2">
      <Choices
        label="In"
        all="every cell"
        choices={cells}
        value={filter.cell}
        onChange={(cell) => onFilter({ ...filter, cell })}
      />
      <Choices
        label="By"
        all="everyone"
        choices={people}
        value={filter.person}
        onChange={(person) => onFilter({ ...filter, person })}
      />
    </div>
  );
}

interface ChoicesProps {
  readonly label: string;
  readonly all: string;
  readonly choices: readonly Choice[];
  readonly value: string;
  readonly onChange: (value: string) => void;
}

function Choices({ label, all, choices, value, onChange }: ChoicesProps) {
  const id = useId();
  const isKnown = value === "" || choices.some((choice) => choice.id === value);
  return (
    <span className="flex items-center gap-2">
      <label htmlFor={id} className="type-small text-ink2">
        {label}
      </label>
      <select
        id={id}
        className="field-line w-auto! max-w-52"
        value={value}
        onChange={(event) => onChange(event.target.value)}
      >
        <option value="">{all}</option>
        {choices.map((choice) => (
          <option key={choice.id} value={choice.id}>
            {choice.name}
          </option>
        ))}
        {!isKnown && <option value={value}>one no longer here</option>}
      </select>
    </span>
  );
}
