import type { QueryClient } from "@tanstack/react-query";
import { lazy } from "react";
import { createBrowserRouter, type RouteObject } from "react-router-dom";
import { someoneSignedIn } from "./doorkeeper.ts";
import { PageFault } from "./page-fault.tsx";
import { Waiting } from "./waiting.tsx";
import { afterFirstFinding } from "./workspace/first-finding.ts";

/** What stands on the live document may come after what can be read without it. */
const Workspace = lazy(() => afterFirstFinding(() => import("./pages/workspace.tsx")));
const History = lazy(() => import("./pages/history.tsx"));
const Compare = lazy(() => afterFirstFinding(() => import("./pages/compare.tsx")));
const OpenedCell = lazy(() => afterFirstFinding(() => import("./pages/opened-cell.tsx")));

/** A page loaded when it is first gone to. */
const page = (load: () => Promise<{ default: React.ComponentType }>) => async () => ({
  Component: (await load()).default,
});

/** A part of the administration; they are loaded together. */
const part = (name: "Messages" | "Accounts" | "InstallationJournal") => async () => ({
  Component: (await import("./pages/administration-parts.tsx"))[name],
});

export function routes(client: QueryClient): RouteObject[] {
  return [
    {
      ErrorBoundary: PageFault,
      HydrateFallback: Waiting,
      children: [
        { path: "/sign-in", lazy: page(() => import("./pages/sign-in.tsx")) },
        { path: "/create-account", lazy: page(() => import("./pages/create-account.tsx")) },
        { path: "/create-account/:token", lazy: page(() => import("./pages/finish-account.tsx")) },
        { path: "/forgotten-passphrase", lazy: page(() => import("./pages/forgotten-passphrase.tsx")) },
        { path: "/reset-passphrase/:token", lazy: page(() => import("./pages/reset-passphrase.tsx")) },
        { path: "/confirm-address/:token", lazy: page(() => import("./pages/confirm-address.tsx")) },
        { path: "/invitation/:token", lazy: page(() => import("./pages/invitation.tsx")) },
        { path: "/referee/:token", lazy: page(() => import("./pages/referee.tsx")) },
        {
          loader: someoneSignedIn(client),
          // Asked once on the way in; moving between pages asks no more.
          shouldRevalidate: () => false,
          children: [
            { path: "/", lazy: page(() => import("./pages/studies.tsx")) },
            { path: "/account", lazy: page(() => import("./pages/account.tsx")) },
            {
              path: "/administration",
              lazy: page(() => import("./pages/administration.tsx")),
              children: [
                { index: true, lazy: part("Messages") },
                { path: "accounts", lazy: part("Accounts") },
                { path: "journal", lazy: part("InstallationJournal") },
              ],
            },
            {
              path: "/studies/:studyId",
              lazy: page(() => import("./pages/study.tsx")),
              children: [
                { index: true, Component: Workspace },
                { path: "cells/:cellId", Component: OpenedCell },
                { path: "compare/:leftId/:rightId", Component: Compare },
                { path: "history", Component: History },
              ],
            },
          ],
        },
        { path: "*", lazy: page(() => import("./pages/not-found.tsx")) },
      ],
    },
  ];
}

export const createRouter = (client: QueryClient) => createBrowserRouter(routes(client));
