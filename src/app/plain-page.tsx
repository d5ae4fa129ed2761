import type { ReactNode } from "react";
import { TopBar } from "../components/top-bar.tsx";
import { usePageTitle } from "../lib/page-title.ts";
import { pages } from "../lib/paths.ts";

/** A page of a few words. */
export function PlainPage({ title, children }: { title: string; children: ReactNode }) {
  usePageTitle(title);
  return (
    <>
      <TopBar home={pages.studies} />
      <main className="mx-auto max-w-2xl px-6 py-16">
        <h1 className="type-title pb-4">{title}</h1>
        {children}
      </main>
    </>
  );
}
