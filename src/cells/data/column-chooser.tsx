import { Popover } from "radix-ui";
import { useEffect, useId, useRef } from "react";
import { ChoiceControl, FormRow } from "../form/fields.tsx";
import type { ColumnChoice } from "./column-choices.ts";
import { useColumnList } from "./use-column-list.ts";

interface ColumnChooserProps {
  readonly value: string;
  readonly choices: readonly ColumnChoice[];
  readonly onChange: (value: string) => void;
  readonly readOnly: boolean;
  /** What leaving it open means: "none", "price × quantity". Absent when it must be chosen. */
  readonly none?: string;
  readonly id?: string;
  readonly "aria-label"?: string;
}

/**
 * One of an upload's columns: typed, or taken from a list that says of each what it seems to be, its range and first
 * values, and below the list what the one pointed at says again that others say.
 */
export function ColumnChooser(props: ColumnChooserProps) {
  const { value, choices, onChange, readOnly, none } = props;
  const own = useId();
  const field = useRef<HTMLInputElement>(null);
  const list = useColumnList({ value, choices, hasNone: none !== undefined, onChange });
  const { isOpen, offered, place } = list;
  if (readOnly) {
    const known = choices.map(({ name }) => ({ value: name, label: name }));
    return <ChoiceControl {...props} choices={known} mono={value !== ""} />;
  }
  const optionId = (at: number) => `${own}-${at}`;
  const pointed = offered[place];
  const isKnown = value === "" || choices.some(({ name }) => name === value);
  return (
    <Popover.Root open={isOpen} onOpenChange={(open) => !open && list.close()}>
      <Popover.Anchor asChild>
        <input
          ref={field}
          id={props.id}
          type="text"
          role="combobox"
          aria-label={props["aria-label"]}
          aria-expanded={isOpen}
          aria-controls={isOpen && offered.length > 0 ? `${own}-list` : undefined}
          aria-autocomplete="list"
          aria-activedescendant={isOpen && offered.length > 0 ? optionId(place) : undefined}
          aria-invalid={isKnown ? undefined : true}
          value={list.typed ?? (isKnown || isOpen ? value : `${value}, not known here`)}
          placeholder={none ?? "choose"}
          spellCheck={false}
          autoComplete="off"
          onChange={(event) => list.type(event.target.value)}
          onClick={(event) => {
            list.open();
            event.currentTarget.select();
          }}
          onFocus={(event) => event.target.select()}
          onBlur={list.close}
          onKeyDown={list.onKeyDown}
          className="column-field"
        />
      </Popover.Anchor>
      <Popover.Portal>
        <Popover.Content
          role="group"
          aria-label="Columns"
          align="start"
          sideOffset={4}
          collisionPadding={8}
          className="popover column-choices"
          // The field keeps the keyboard; the list is pointed at from there.
          onOpenAutoFocus={(event) => event.preventDefault()}
          onCloseAutoFocus={(event) => event.preventDefault()}
          onInteractOutside={(event) => field.current?.contains(event.target as Node) && event.preventDefault()}
          // Without this the field would be left before the press that chooses is over.
          onMouseDown={(event) => event.preventDefault()}
        >
          {offered.length === 0 ? (
            <p className="column-said">No column fits what is typed.</p>
          ) : (
            <div role="listbox" id={`${own}-list`} aria-label="Columns" className="column-list">
              {offered.map((choice, at) => (
                <ColumnOption
                  key={choice?.name ?? ""}
                  id={optionId(at)}
                  choice={choice}
                  none={none ?? ""}
                  isPointed={at === place}
                  isChosen={(choice?.name ?? "") === value}
                  onPoint={() => list.setPointed(at)}
                  onChoose={() => list.choose(choice)}
                />
              ))}
            </div>
          )}
          {pointed && pointed.agreements.length > 0 && (
            <div className="column-said" role="status">
              {pointed.agreements.map((sentence) => (
                <p key={sentence}>{sentence}</p>
              ))}
            </div>
          )}
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  );
}

interface ColumnOptionProps {
  readonly id: string;
  readonly choice: ColumnChoice | undefined;
  readonly none: string;
  readonly isPointed: boolean;
  readonly isChosen: boolean;
  readonly onPoint: () => void;
  readonly onChoose: () => void;
}

function ColumnOption({ id, choice, none, isPointed, isChosen, onPoint, onChoose }: ColumnOptionProps) {
  const self = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (isPointed) self.current?.scrollIntoView?.({ block: "nearest" });
  }, [isPointed]);
  return (
    // biome-ignore lint/a11y/useFocusableInteractive: the field keeps the focus and names the option pointed at
    // biome-ignore lint/a11y/useKeyWithClickEvents: keys are the field's
    <div
      ref={self}
      id={id}
      role="option"
      aria-selected={isChosen}
      data-pointed={isPointed || undefined}
      className="column-option"
      onMouseMove={onPoint}
      onClick={onChoose}
    >
      {choice === undefined ? (
        <span className="font-serif italic">{none}</span>
      ) : (
        <>
          <span className="type-source min-w-0 break-words">{choice.name}</span>{" "}
          <span className="text-right">{choice.lies}</span>{" "}
          <span className="column-meaning">{choice.meaning ?? "not recognised"}</span>{" "}
          <span className="column-values">{choice.values}</span>
        </>
      )}
    </div>
  );
}

export function ColumnField({ label, ...chooser }: ColumnChooserProps & { readonly label: string }) {
  const id = useId();
  return (
    <FormRow label={label} htmlFor={chooser.readOnly ? undefined : id}>
      <ColumnChooser id={id} {...chooser} />
    </FormRow>
  );
}
