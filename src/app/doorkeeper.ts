import type { QueryClient } from "@tanstack/react-query";
import { type LoaderFunctionArgs, redirect } from "react-router-dom";
import { meOptions } from "../features/accounts/api/get-me.ts";
import { ApiRefusal } from "../lib/api.ts";
import { pages } from "../lib/paths.ts";

/** Lets someone signed in through; shows everyone else the door, and remembers where they were going. */
export const someoneSignedIn =
  (client: QueryClient) =>
  async ({ request }: LoaderFunctionArgs) => {
    try {
      return await client.ensureQueryData(meOptions);
    } catch (error) {
      if (!(error instanceof ApiRefusal) || error.status !== 401) throw error;
      const { pathname } = new URL(request.url);
      throw redirect(pathname === pages.studies ? pages.signIn : `${pages.signIn}?to=${encodeURIComponent(pathname)}`);
    }
  };

/** Where to go after signing in: a page of this installation, or the studies. */
export function destinationOf(search: string): string {
  const to = new URLSearchParams(search).get("to") ?? "";
  // Two slashes would lead to another host.
  return /^\/(?![/\\])/.test(to) ? to : pages.studies;
}
