import { QueryClientProvider } from "@tanstack/react-query";
import { RouterProvider } from "react-router-dom";
import { pages } from "../lib/paths.ts";
import { createQueryClient } from "../lib/query-client.ts";
import { createRouter } from "./router.tsx";

const client = createQueryClient(toTheDoor);
const router = createRouter(client);

/** The session has ended: what is written is kept in this browser, and the way back is remembered. */
function toTheDoor(): void {
  client.clear();
  const { pathname } = router.state.location;
  void router.navigate(`${pages.signIn}?to=${encodeURIComponent(pathname)}`);
}

export function Application() {
  return (
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  );
}
