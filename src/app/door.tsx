import type { ReactNode } from "react";
import { Mark } from "../components/mark.tsx";
import { useInstallation } from "../features/accounts/api/get-installation.ts";
import { IndifferenceDrawing } from "../features/accounts/indifference-drawing.tsx";
import { installationInWords } from "./installation-words.ts";
import { ThemeWords } from "./theme-words.tsx";

/** The door: the drawing on the source page, the form on the finding page. */
export function Door({ title, children }: { title: string; children: ReactNode }) {
  const { data: installation } = useInstallation();
  return (
    <div className="door">
      <div className="door-drawing">
        <IndifferenceDrawing />
      </div>
      <main className="door-page">
        <div className="w-full max-w-[27rem]">
          <p className="flex items-center gap-4 pb-9">
            <Mark size={42} />
            <span className="font-serif font-medium text-[2rem]/[2.5rem] tracking-[-0.012em]">Tangency</span>
          </p>
          <h1 className="type-title pb-10 door-title">Demand systems, estimated together, open to checking.</h1>
          <h2 className="sr-only">{title}</h2>
          {children}
          <p className="mt-10 max-w-[24rem] border-rule2 border-t pt-4 text-ink2">
            Reading a referee copy? Open the link you were given. It needs no account.
          </p>
        </div>
        <footer className="type-small mt-auto flex w-full max-w-[27rem] flex-wrap items-baseline justify-between gap-x-6 gap-y-2 pt-12 text-ink2">
          <span>{installation && installationInWords(installation.name)}</span>
          <ThemeWords />
        </footer>
      </main>
    </div>
  );
}
