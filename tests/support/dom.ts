import "@testing-library/jest-dom/vitest";
import { cleanup, configure } from "@testing-library/react";
import { afterEach } from "vitest";

// What is awaited comes at once on a machine at rest; on a busy one it may take longer, and is no less right.
configure({ asyncUtilTimeout: 15_000 });

/** Each test has a page of its own. */
afterEach(cleanup);

// The machine's own custom is no matter of a test; where it is, the test says whose (tests/src/lib/formats.test.ts).
Object.defineProperty(navigator, "language", { value: "en-GB", configurable: true });
