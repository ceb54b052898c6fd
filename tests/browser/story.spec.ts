import { createHash } from "node:crypto";
import { readFile } from "node:fs/promises";
import { expect, test, type Page } from "@playwright/test";
import canonicalize from "canonicalize";

import { keyOfThirty } from "./support/key-of-thirty";
import { linkIn, mailsTo, waitForMail } from "./support/mail";
import { demoPerson, freshPage, signIn } from "./support/product";

const stamp = Date.now().toString(36);
const AUTHOR = {
  name: "Perrin Haldane-Sole",
  email: `perrin-${stamp}@example.org`,
  password: "seven quiet lanterns",
};
const SECOND = { name: "Yusra Tolvaj", email: `yusra-${stamp}@example.org`, password: "copper kettle orbit" };
const PRODUCTION = {
  name: "Odd Fennimore",
  email: `odd-${stamp}@example.org`,
  password: "margin of warm paper",
};
const TITLE = `Coupled Spins ${stamp}`;

/** From a file of thirty claims to the key that is printed from it, as the people of a work would go. */
test("a chapter goes from a form and a file to a frozen key", async ({ browser }) => {
  test.setTimeout(300_000);
  const lead = await freshPage(browser);
  const key = keyOfThirty();
  let work = "";
  let chapter = "";

  await test.step("the lead creates a work with a chapter", async () => {
    await signIn(lead, demoPerson("lead"));
    await lead.goto("/works/new");
    await lead.getByLabel("Title").fill(TITLE);
    await lead.getByRole("radio", { name: /course pack/i }).check({ force: true });
    await lead.getByRole("button", { name: "Start the work" }).click();
    await expect(lead.getByRole("heading", { level: 1 })).toHaveText(TITLE);
    work = new URL(lead.url()).pathname;
    await lead.getByRole("button", { name: "Add the first chapter" }).click();
    const dialog = lead.getByRole("dialog");
    await dialog.getByLabel("Number").fill("4");
    await dialog.getByLabel("Title").fill("Two spins and a third");
    await dialog.getByRole("button", { name: "Add the chapter" }).click();
    await lead
      .getByRole("link", { name: /Two spins and a third/ })
      .first()
      .click();
    await expect(lead).toHaveURL(/\/chapters\//);
    chapter = new URL(lead.url()).pathname;
  });

  await test.step("the lead invites two authors and production by e-mail", async () => {
    for (const [person, role] of [
      [AUTHOR, "author"],
      [SECOND, "author"],
      [PRODUCTION, "production"],
    ] as const) {
      await lead.goto(`${work}/people`);
      await lead.getByLabel("E-mail address").fill(person.email);
      await lead.getByRole("radio", { name: new RegExp(`^${role}`, "i") }).check({ force: true });
      await lead.getByRole("button", { name: "Send the invitation", exact: true }).click();
      await expect(lead.getByText(person.email).first()).toBeVisible();
    }
  });

  const join = async (person: typeof AUTHOR): Promise<Page> => {
    const mail = await waitForMail(person.email, /invites you/);
    expect(mail.text).toContain(TITLE);
    const page = await freshPage(browser);
    await page.goto(linkIn(mail));
    await page.getByLabel("Your name").fill(person.name);
    await page.getByLabel("Choose a password").fill(person.password);
    await page.getByRole("button", { name: "Accept the invitation" }).click();
    await expect(page.getByRole("heading", { level: 1 })).toContainText(TITLE);
    return page;
  };
  const author = await join(AUTHOR);
  const second = await join(SECOND);
  const production = await join(PRODUCTION);

  await test.step("an invitation works once", async () => {
    const page = await freshPage(browser);
    await page.goto(linkIn(await waitForMail(AUTHOR.email, /invites you/)));
    await expect(page.getByRole("button", { name: "Accept the invitation" })).toHaveCount(0);
    await page.context().close();
  });

  await test.step("the author types two claims and sees the verdict while typing", async () => {
    await author.goto(chapter);
    await author.getByRole("button", { name: "Add a problem" }).click();
    await author.getByLabel("Label").fill("4.1");
    await author.getByLabel("Statement").fill("Evaluate the coefficients that couple $l = 1$ with $l' = 1$.");
    await author.getByRole("button", { name: "Save problem" }).click();
    await author.getByRole("button", { name: "Add a claim to problem 4.1" }).click();

    await author.getByText("typed line").click();
    await author.getByLabel("Quantity").fill("(1 1 2; 0 0 0)");
    await author.getByLabel("Claimed value").fill("sqrt(2/15)");
    await expect(author.getByText(/confirmed/i).first()).toBeVisible();
    await author.getByRole("button", { name: "Save claim" }).click();
    await expect(author.getByText("4.1(a)").first()).toBeVisible();

    await expect(author.getByLabel("Reference")).toHaveValue("4.1(b)");
    await author.getByText("typed line").click();
    await author.getByLabel("Quantity").fill("<1 0 1 0 | 2 0>");
    await author.getByLabel("Claimed value").fill("sqrt(2/3)");
    await expect(author.getByText(/confirmed/i).first()).toBeVisible();
    await author.getByRole("button", { name: "Save claim" }).click();
    await expect(author.locator("#main, main").getByText("4.1(b)").first()).toBeVisible();
  });

  await test.step("the author uploads thirty claims and accepts them after looking", async () => {
    await author.goto(chapter);
    await author.getByLabel("Key files to upload").setInputFiles({
      name: "chapter-4.csv",
      mimeType: "text/csv",
      buffer: Buffer.from(key.csv, "utf8"),
    });
    await author.getByRole("list", { name: "Uploads" }).getByRole("link").click();
    await expect(author).toHaveURL(/\/sources\//);
    await expect(author.getByText("4.4(j)").first()).toBeVisible();
    await author.getByRole("button", { name: "Accept all 30 rows" }).click();
    await expect(author).toHaveURL(new RegExp(`${chapter}`));
  });

  await test.step("a run judges the thirty-two claims while the page shows it", async () => {
    await author.goto(chapter);
    await author.getByRole("button", { name: "Start a run" }).click();
    await expect(author).toHaveURL(/\/runs\//);
    await expect(author.getByText(/32 of 32/).first()).toBeVisible({ timeout: 30_000 });
    await expect(author.getByRole("link", { name: /flags/i }).first()).toBeVisible();
    for (const ref of key.wrong) await expect(author.getByText(ref, { exact: false }).first()).toBeVisible();
  });

  await test.step("the author cannot settle a flag on a claim of their own", async () => {
    await author.goto(`${work}/flags`);
    await author.getByRole("link", { name: key.wrong[0]! }).first().click();
    await expect(author.getByText("Somebody else settles this flag")).toBeVisible();
    await expect(author.getByRole("button", { name: /^Settle/ })).toHaveCount(0);
  });

  await test.step("the second author gets one digest for the five flags", async () => {
    const digest = await waitForMail(SECOND.email, /5 flags/);
    for (const { quantity, claimed } of key.rows) {
      expect(digest.text).not.toContain(quantity);
      expect(claimed.length < 6 || !digest.text?.includes(claimed)).toBe(true);
    }
    await second.goto(linkIn(digest));
    await expect(second).toHaveURL(new RegExp(`${work}/flags`));
    expect((await mailsTo(SECOND.email)).filter(({ subject }) => /flag/.test(subject ?? ""))).toHaveLength(1);
  });

  const settle = async (ref: string, word: string, fill: Record<string, string> = {}) => {
    await second.goto(`${work}/flags`);
    await second.getByRole("link", { name: ref }).first().click();
    await expect(second.getByRole("heading", { level: 1 })).toContainText(ref);
    await second.getByRole("radio", { name: new RegExp(`^${word}`) }).check({ force: true });
    for (const [label, words] of Object.entries(fill))
      await second.getByRole("textbox", { name: label }).fill(words);
    await second.getByRole("button", { name: `Settle: ${word}` }).click();
    await expect(second.getByText(`${ref} is settled: ${word}.`)).toBeVisible();
  };

  await test.step("the second author settles the five in four different ways", async () => {
    const [sign, square, sign2, sign3, square2] = key.wrong as [string, string, string, string, string];
    await settle(sign, "correct");
    await settle(sign2, "correct");
    await settle(square, "reword", {
      "What has to change": "Say whether the value or its square is asked for.",
    });
    await settle(sign3, "stet", {
      "Convention it relies on": "Phase of the appendix, table 2: the first triad is read cyclically",
      Reason: "The chapter prints its table with the appendix's overall phase and says so.",
    });
    await settle(square2, "withdraw", { Reason: "Not asked for any more." });
    await second.goto(`${work}/flags`);
    await expect(second.getByText(/nothing/i).first()).toBeVisible();
    const told = await waitForMail(AUTHOR.email, /corrected/);
    expect(told.text).toContain(SECOND.name);
  });

  await test.step("preflight names the claim that waits; the author rewords it and a run confirms it", async () => {
    await lead.goto(`${work}/keys`);
    await expect(lead.getByText(key.wrong[1]!).first()).toBeVisible();
    await expect(lead.getByRole("button", { name: /Freeze key/ })).toHaveCount(0);

    await author.goto(chapter);
    await author.getByRole("link", { name: `Claim ${key.wrong[1]}`, exact: true }).click();
    await expect(author).toHaveURL(/\/claims\//);
    await author.getByRole("button", { name: /Edit/ }).first().click();
    await author.getByLabel("Claimed value").fill("sqrt(14)/14");
    await author.getByRole("button", { name: "Save new version" }).click();
    await author.goto(chapter);
    await author.getByRole("button", { name: "Start a run" }).click();
    await expect(author.getByText(/31 of 31/).first()).toBeVisible({ timeout: 30_000 });
  });

  await test.step("the lead freezes the key", async () => {
    await expect(async () => {
      await lead.goto(`${work}/keys`);
      await expect(lead.getByRole("button", { name: "Freeze key 1" })).toBeVisible({ timeout: 2_000 });
    }).toPass({ timeout: 20_000 });
    await lead.getByLabel(/to sign it/).fill("key 1");
    await lead.getByRole("button", { name: "Freeze key 1" }).click();
    await expect(lead).toHaveURL(`${work}/keys/1`);
    await expect(lead.getByText(/[0-9a-f]{8}/).first()).toBeVisible();
  });

  await test.step("production downloads the key in all three formats and sees nothing else", async () => {
    await production.goto(`${work}/keys/1`);
    const bodies: Record<string, string> = {};
    for (const format of ["json", "csv", "latex"]) {
      const [download] = await Promise.all([
        production.waitForEvent("download"),
        production.locator(`a[href$="/keys/1/${format}"]`).first().click(),
      ]);
      bodies[format] = await readFile(await download.path(), "utf8");
    }
    const { sha256, export: made, ...content } = JSON.parse(bodies.json!) as Record<string, unknown>;
    expect(createHash("sha256").update(canonicalize(content)!).digest("hex")).toBe(sha256);
    expect(JSON.stringify(made)).toContain(PRODUCTION.name);
    expect(JSON.stringify(content)).toContain(TITLE);
    // Thirty-one claims: one was withdrawn. The corrected value stands where the wrong one did.
    for (const { ref } of key.rows) expect(bodies.csv!.includes(`${ref},`), ref).toBe(ref !== key.wrong[4]);
    expect(bodies.csv).toContain("4.1(a),");
    expect(bodies.latex).toContain("\\begin{");
    for (const path of [chapter, `${work}/flags`, `${work}/runs`, `${work}/conventions`])
      expect((await production.goto(path))?.status(), path).toBe(404);
    // Who is on the work is no secret to them; how to reach them is.
    await production.goto(`${work}/people`);
    await expect(production.getByText(AUTHOR.name).first()).toBeVisible();
    expect(await production.content()).not.toContain(AUTHOR.email);
  });

  await test.step("a stranger gets 404 everywhere, the same as for what was never there", async () => {
    const stranger = await freshPage(browser);
    await signIn(stranger, demoPerson("production"));
    const paths = ["", "/flags", "/people", "/conventions", "/keys", "/keys/1", "/runs"].map(
      (end) => work + end,
    );
    const none = work.replace(/[0-9a-f]{8}-/, "00000000-");
    for (const path of [...paths, chapter]) {
      const answer = await stranger.goto(path);
      expect(answer?.status(), path).toBe(404);
      const missing = await stranger.goto(path.replace(work, none));
      expect(missing?.status(), path).toBe(404);
    }
    for (const path of [`/api${work}/keys/1/json`, `/api${work}/keys/1/csv`, `/api${work}/flags`])
      expect((await stranger.request.get(path)).status(), path).toBe(404);
    const signedOut = await freshPage(browser);
    expect([401, 404]).toContain((await signedOut.request.get(`/api${work}/keys/1/json`)).status());
  });
});
