import { createHash } from "node:crypto";
import { expect, test, type Page } from "@playwright/test";

import { webProcess } from "./support/processes";
import { demoPerson, freshPage, signIn } from "./support/product";

/** Waits until the product answers again: its start script starts a killed process anew. */
async function untilBack(page: Page): Promise<void> {
  await expect(async () => {
    const answer = await page.request.get("/api/health", { timeout: 2_000 });
    expect(answer.ok()).toBe(true);
  }).toPass({ timeout: 30_000 });
}

/** The lead stands in a new chapter of a new work. */
async function newChapter(page: Page, title: string): Promise<{ work: string; chapter: string }> {
  await signIn(page, demoPerson("lead"));
  await page.goto("/works/new");
  await page.getByLabel("Title").fill(title);
  await page.getByRole("radio", { name: /course pack/i }).check({ force: true });
  await page.getByRole("button", { name: "Start the work" }).click();
  await page.getByRole("button", { name: "Add the first chapter" }).click();
  await page.getByRole("dialog").getByLabel("Title").fill("One chapter");
  await page.getByRole("dialog").getByRole("button", { name: "Add the chapter" }).click();
  await page
    .getByRole("link", { name: /One chapter/ })
    .first()
    .click();
  await expect(page).toHaveURL(/\/chapters\//);
  const [, work, , chapter] = /\/works\/([^/]+)\/(chapters)\/([^/?]+)/.exec(page.url()) ?? [];
  return { work: work!, chapter: chapter! };
}

const csv = (rows: number) =>
  [
    "ref,quantity,claimed,problem",
    ...Array.from({ length: rows }, (_, i) => `9.${i},(1 1 2; 0 0 0),sqrt(30)/15,9`),
  ].join("\n") + "\n";

test("a killed web process loses nothing that it acknowledged", async ({ browser }) => {
  test.setTimeout(180_000);
  const page = await freshPage(browser);
  const { work, chapter } = await newChapter(page, `Faults ${Date.now().toString(36)}`);
  const bytes = Buffer.from(csv(400), "utf8");
  const send = (name: string) =>
    page.request.post(`/api/works/${work}/sources?chapter=${chapter}&name=${name}`, {
      data: bytes,
      headers: { "content-type": "application/octet-stream", "sec-fetch-site": "same-origin" },
    });

  const answer = await send("kept.csv");
  process.kill(webProcess(), "SIGKILL");
  expect(answer.status()).toBe(201);
  const { id } = (await answer.json()) as { id: string };
  await untilBack(page);

  const kept = await page.request.get(`/api/works/${work}/sources/${id}/bytes`);
  const sha256 = (body: Buffer) => createHash("sha256").update(body).digest("hex");
  expect(sha256(await kept.body())).toBe(sha256(bytes));

  // The rows are accepted, and the process dies while they enter: they are in whole or not at all, and once.
  await page.goto(`/works/${work}/sources/${id}`);
  const accept = page.getByRole("button", { name: "Accept all 400 rows" });
  await accept.click();
  await page.waitForTimeout(40);
  process.kill(webProcess(), "SIGKILL");
  await untilBack(page);
  await page.goto(`/works/${work}/sources/${id}`);
  if (await accept.isVisible()) {
    await accept.click();
    await expect(page).toHaveURL(/\/chapters\//);
  }
  await page.goto(`/works/${work}`);
  await expect(page.getByText("400 claims in 1 chapter")).toBeVisible();
});
