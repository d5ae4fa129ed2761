import type { Page } from "playwright-core";

/** What a page does that it should not: requests elsewhere, errors on its console, failures of its scripts. */
export function watch(page: Page, origin: string) {
  const outside: string[] = [];
  const requests: string[] = [];
  let faults: string[] = [];
  const isOurs = (address: string) =>
    address.startsWith(`${origin}/`) ||
    /^(data|blob):/.test(address) ||
    address.startsWith(origin.replace("http", "ws"));
  const note = (address: string) => {
    requests.push(address);
    if (!isOurs(address)) outside.push(address);
  };
  page.on("request", (request) => note(request.url()));
  page.on("websocket", (socket) => note(socket.url()));
  page.on("worker", (worker) => note(worker.url()));
  page.on("pageerror", (error) => faults.push(`script: ${error.message}`));
  page.on("console", (message) => {
    if (message.type() === "error") faults.push(`console: ${message.text()} (${message.location().url})`);
  });
  return {
    /** Addresses beyond the installation that were asked for. */
    outside,
    /** Every address that was asked for. */
    requests,
    /** What went wrong since this was last asked. */
    takeFaults(): string[] {
      const taken = faults;
      faults = [];
      return taken;
    },
  };
}
