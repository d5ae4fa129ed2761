import { SwitchWords } from "../../components/switch-words.tsx";

/** Which of two stages the tables below are of. */
export type StageShown = "unconditional" | "conditional";

export function StageSwitch({ stage, onChange }: { stage: StageShown; onChange: (stage: StageShown) => void }) {
  return (
    <SwitchWords
      label="Stage"
      value={stage}
      onChange={onChange}
      words={[
        { value: "unconditional", word: "Unconditional" },
        { value: "conditional", word: "Conditional" },
      ]}
    />
  );
}
