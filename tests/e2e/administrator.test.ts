import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { choose } from "./study-page.ts";
import { demoStudyId, ILSE, linkSentTo, openBrowser, PASSPHRASE, PETRA, Product, signIn, TOMAS } from "./support.ts";

/** Whoever runs the installation, and the ways in and out that pass by them: messages, accounts, sessions. */
let product: Product;
let browser: Browser;
let ilse: Page;
let studyId: string;

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  ilse = await signIn(browser, product, ILSE);
  studyId = await demoStudyId(ilse);
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

const heading = (page: Page, name: string) => page.getByRole("heading", { name }).first().waitFor();

it("reads in the local post box what would have been sent, and finds accounts and journal", async () => {
  const visitor = await (await browser.newContext({ baseURL: product.origin })).newPage();
  await visitor.goto("/sign-in");
  await visitor.getByRole("link", { name: "Forgotten passphrase" }).click();
  await visitor.getByRole("button", { name: "Send the link" }).waitFor();
  await visitor.getByLabel("Email").fill(PETRA.email);
  await visitor.getByRole("button", { name: "Send the link" }).click();
  await visitor.getByText(`A message is on its way to ${PETRA.email}`).waitFor();
  await ilse.getByRole("link", { name: "Administration" }).click();
  await ilse.getByText("No mail server is set.").waitFor();
  await heading(ilse, "Set a new passphrase");
  await ilse.getByText("Read it").first().click();
  await ilse.getByText("Petra Vance, someone, most likely you, has forgotten").waitFor();
  await ilse.getByRole("link", { name: "Accounts" }).click();
  await ilse.getByText(TOMAS.email).waitFor();
  await ilse.getByRole("link", { name: "Journal" }).click();
  await ilse.getByText("Nothing has been written down yet.").waitFor();

  await visitor.goto(await linkSentTo(product, PETRA.email));
  await visitor.getByLabel("New passphrase", { exact: true }).fill("another one altogether");
  await visitor.getByRole("button", { name: "Set the passphrase" }).click();
  await visitor.getByText("The new passphrase is set").waitFor();
  await ilse.reload();
  await ilse.getByText("Petra Vance set a new passphrase by a link.").waitFor();
  await visitor.context().close();
});

it("nobody else is shown any of it", async () => {
  const tomas = await signIn(browser, product, TOMAS);
  expect(await tomas.getByRole("link", { name: "Administration" }).count()).toBe(0);
  await tomas.goto("/administration");
  await tomas.getByText("you are not one of them").waitFor();
  await tomas.context().close();
});

it("ends a session elsewhere, whose open study closes at once", async () => {
  const elsewhere = await signIn(browser, product, ILSE);
  await elsewhere.goto(`/studies/${studyId}`);
  await heading(elsewhere, "survey");
  await ilse.goto("/account");
  await ilse.getByText("this one").waitFor();
  const others = ilse.getByRole("button", { name: /^End all \d+ others$/ });
  if (await others.isVisible()) await others.click();
  else await ilse.getByRole("button", { name: /^End / }).click();
  await elsewhere
    .getByText(/session has ended|Sign in/)
    .first()
    .waitFor();
  await ilse.getByRole("button", { name: /^End / }).first().waitFor({ state: "detached" });
  await elsewhere.context().close();
});

it("hands a study over, and deletes and brings back another", async () => {
  await ilse.goto(`/studies/${studyId}`);
  await choose(ilse, "People");
  const dialog = ilse.getByRole("dialog", { name: "People" });
  await dialog.getByRole("button", { name: "Hand over", exact: true }).click();
  await dialog.getByRole("button", { name: `Hand over to ${TOMAS.name}` }).click();
  await dialog.getByRole("button", { name: "Leave the study" }).waitFor();
  await ilse.keyboard.press("Escape");
  // In the new role, the page's connection is another one.
  await ilse.goto(`/studies/${studyId}`);
  await heading(ilse, "survey");
  await choose(ilse, "Journal");
  await ilse.getByText(`Ilse Marchetti handed the study over to ${TOMAS.name}.`).waitFor();
  await ilse.keyboard.press("Escape");

  await ilse.goto("/");
  await ilse.getByRole("button", { name: "New study" }).click();
  await ilse.getByLabel("Title").fill("A draft of last winter");
  await ilse.getByRole("button", { name: "Make the study" }).click();
  await choose(ilse, "Delete the study");
  await ilse.getByRole("button", { name: "Delete A draft of last winter" }).click();
  await ilse.getByRole("button", { name: "Deleted 1" }).click();
  await ilse.getByRole("button", { name: "Bring back A draft of last winter" }).click();
  await ilse.getByRole("button", { name: "All 2" }).click();
  await ilse.getByRole("button", { name: "Put away A draft of last winter" }).click();
  await ilse.getByRole("button", { name: "Put away 1" }).click();
  await ilse.getByRole("link", { name: "A draft of last winter" }).waitFor();
});

it("an invitation is for the account it names, and for nobody else who opens it", async () => {
  const tomas = await signIn(browser, product, TOMAS);
  await tomas.request.post(`/api/studies/${studyId}/invitations`, {
    data: { email: "nora.lind@vihe.example", role: "reader" },
    headers: { origin: product.origin },
  });
  const link = await linkSentTo(product, "nora.lind@vihe.example");
  await tomas.goto(link);
  await tomas
    .getByText(`You are signed in as ${TOMAS.email}, and the invitation is for nora.lind@vihe.example.`)
    .waitFor();
  await tomas.getByRole("button", { name: "Sign out" }).click();
  await tomas.getByLabel("Name").fill("Nora Lind");
  await tomas.getByLabel("Passphrase", { exact: true }).fill(PASSPHRASE);
  await tomas.getByRole("button", { name: "Create the account and accept" }).click();
  await tomas.waitForURL((url) => url.pathname === `/studies/${studyId}`);
  await heading(tomas, "survey");
  await tomas.context().close();
});
