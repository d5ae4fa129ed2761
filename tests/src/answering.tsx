import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import type { ReactElement } from "react";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { vi } from "vitest";

export interface Asked {
  readonly method: string;
  readonly path: string;
  readonly body: unknown;
}
type Answer = unknown | ((asked: Asked) => unknown);

export class Refused {
  readonly status: number;
  readonly sentence: string;
  readonly problems: readonly unknown[];

  constructor(status: number, sentence: string, problems: readonly unknown[] = []) {
    this.status = status;
    this.sentence = sentence;
    this.problems = problems;
  }
}

/** Stands in for the API: "GET /api/me" and its answer. What is asked without an answer here fails the test. */
export function answering(answers: Readonly<Record<string, Answer>>): Asked[] {
  const asked: Asked[] = [];
  vi.stubGlobal("fetch", async (path: string, init: RequestInit = {}) => {
    const method = init.method ?? "GET";
    const one = { method, path, body: init.body ? JSON.parse(String(init.body)) : undefined };
    asked.push(one);
    const key = `${method} ${path}`;
    if (!(key in answers)) return respond(new Refused(500, `Nothing in this test answers ${key}.`));
    const answer = answers[key];
    return respond(typeof answer === "function" ? (answer as (asked: Asked) => unknown)(one) : answer);
  });
  return asked;
}

function respond(answer: unknown): Response {
  if (answer instanceof Refused) {
    const { status, sentence, problems } = answer;
    return new Response(JSON.stringify({ error: { code: "refused", sentence, problems } }), { status });
  }
  return new Response(answer === undefined ? null : JSON.stringify(answer), {
    status: answer === undefined ? 204 : 200,
  });
}

/** Renders a part of a page where it finds what pages give it: a query client and a router. */
export function renderPart(part: ReactElement, at = "/") {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false }, mutations: { retry: false } } });
  const router = createMemoryRouter([{ path: "*", element: part }], { initialEntries: [at] });
  const view = render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { ...view, client, router, user: userEvent.setup() };
}
