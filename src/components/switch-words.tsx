interface SwitchWordsProps<T extends string> {
  readonly label: string;
  readonly words: readonly { readonly value: T; readonly word: string }[];
  /** The one in use; none while neither page is open. */
  readonly value: T | undefined;
  readonly onChange: (value: T) => void;
}

/** Two or three words of which one is in use: *Form* and *Text*. */
export function SwitchWords<T extends string>({ label, words, value, onChange }: SwitchWordsProps<T>) {
  return (
    <fieldset className="m-0 flex shrink-0 gap-3.5 border-0 p-0">
      <legend className="sr-only">{label}</legend>
      {words.map(({ value: own, word }) => (
        <button
          key={own}
          type="button"
          className="switch-word type-small"
          aria-pressed={own === value}
          onClick={() => onChange(own)}
        >
          {word}
        </button>
      ))}
    </fieldset>
  );
}
