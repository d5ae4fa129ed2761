import type { Installation } from "../../../shared/schemas/resources.ts";
import { useInstallation } from "./api/get-installation.ts";

type DemoSignIn = Installation["demo"][number];

interface DemoSignInsProps {
  readonly busy: boolean;
  readonly onChoose: (signIn: DemoSignIn) => void;
}

/** On an installation that shows the demo study, its people's sign-ins, each one click. */
export function DemoSignIns({ busy, onChoose }: DemoSignInsProps) {
  const { data } = useInstallation();
  if (!data || data.demo.length === 0) return null;
  return (
    <section aria-label="The demo study" className="mt-8 border-rule2 border-t pt-4">
      <p className="text-ink2">This installation has a demo study. Sign in as one of its people:</p>
      <ul className="pt-1.5">
        {data.demo.map((signIn) => (
          <li key={signIn.email} className="flex flex-wrap items-baseline gap-x-2.5 py-0.5">
            <button type="button" className="word" disabled={busy} onClick={() => onChoose(signIn)}>
              {signIn.email}
            </button>
            <span className="type-small text-ink3">{signIn.role}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
