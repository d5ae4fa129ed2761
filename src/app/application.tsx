import { QueryClientProvider } from "@tanstack/react-query";
import { RouterProvider } from "react-router-dom";
import { createQueryClient } from "../lib/query-client.ts";
import { createRouter } from "./router.tsx";

const client = createQueryClient();
const router = createRouter(client);

export function Application() {
  return (
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  );
}
