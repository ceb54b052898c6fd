import { mkdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { parseArgs } from "node:util";
import { chromium, type Browser, type Page } from "@playwright/test";

/**
 * Writes a picture of every page of a running product, as the people of the demo work see them: light and dark, wide and
 * phone-narrow. `npm run screenshots -- [--url http://localhost:3000] [--local .local] [--out .local/screenshots] [--only PART]`
 */
const { values: given } = parseArgs({
  options: {
    url: { type: "string", default: "http://localhost:3000" },
    local: { type: "string", default: ".local" },
    out: { type: "string", default: ".local/screenshots" },
    only: { type: "string", default: "" },
    size: { type: "string", default: "" },
    theme: { type: "string", default: "" },
  },
});

const SIZES = { wide: { width: 1440, height: 900 }, narrow: { width: 360, height: 740 } } as const;
const THEMES = ["light", "dark"] as const;

type Person = { email: string; password: string; role: string };
const people = JSON.parse(readFileSync(path.join(given.local, "demo.json"), "utf8")) as Person[];
const person = (role: string) => people.find((one) => one.role === role);

async function signedIn(browser: Browser, role: string): Promise<Page> {
  const page = await (await browser.newContext({ baseURL: given.url, locale: "en-GB" })).newPage();
  const who = person(role);
  if (!who) return page;
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(who.email);
  await page.getByLabel("Password", { exact: true }).fill(who.password);
  await page.getByRole("button", { name: "Sign in", exact: true }).first().click();
  await page.waitForURL("**/desk");
  return page;
}

/** The first address on the current page whose path fits. */
const linkLike = async (page: Page, pattern: RegExp): Promise<string | null> =>
  page
    .locator("a[href]")
    .evaluateAll(
      (links, source) =>
        links.map((a) => a.getAttribute("href")).find((href) => new RegExp(source).test(href ?? "")) ?? null,
      pattern.source,
    );

/** Finds the demo's own addresses by walking its links, since ids are made up by each installation. */
async function addresses(lead: Page): Promise<Record<string, string>> {
  const found: Record<string, string> = {};
  const note = async (name: string, pattern: RegExp) => {
    const href = await linkLike(lead, pattern);
    if (href) found[name] = href;
  };
  await lead.goto("/desk");
  await note("work", /^\/works\/[0-9a-f-]{36}$/);
  if (!found.work) return found;
  await lead.goto(found.work);
  await note("chapter", /\/chapters\/[0-9a-f-]{36}$/);
  for (const part of ["people", "conventions", "flags", "keys", "runs"])
    found[part] = `${found.work}/${part}`;
  await lead.goto(`${found.flags}?state=open`);
  await note("flag", /\/flags\/[0-9a-f-]{36}/);
  await lead.goto(`${found.flags}?state=settled`);
  await note("settled-flag", /\/flags\/[0-9a-f-]{36}/);
  await lead.goto(found.keys!);
  await note("key", /\/keys\/\d+$/);
  await lead.goto(found.runs!);
  await note("run", /\/runs\/[0-9a-f-]{36}$/);
  if (found.chapter) {
    await lead.goto(found.chapter);
    await note("claim", /\/claims\/[0-9a-f-]{36}$/);
    await note("source", /\/sources\/[0-9a-f-]{36}$/);
  }
  return found;
}

async function shoot(page: Page, name: string, address: string): Promise<void> {
  if (!name.includes(given.only)) return;
  for (const [size, viewport] of Object.entries(SIZES))
    for (const theme of THEMES) {
      if ((given.size && given.size !== size) || (given.theme && given.theme !== theme)) continue;
      await page.setViewportSize(viewport);
      await page.context().addCookies([{ name: "theme", value: theme, url: given.url }]);
      await page.goto(address);
      // Live pages never fall silent, so what is waited for is the fonts, not the network.
      await page.evaluate(async () => document.fonts.ready.then(() => undefined));
      await page.waitForTimeout(250);
      await page.screenshot({ path: path.join(given.out, `${name}-${size}-${theme}.png`), fullPage: true });
    }
  console.error(name);
}

mkdirSync(given.out, { recursive: true });
const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
  args: [
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
  ],
});
try {
  const visitor = await (await browser.newContext({ baseURL: given.url })).newPage();
  for (const [name, address] of Object.entries({
    front: "/",
    verdicts: "/about/verdicts",
    "sign-in": "/sign-in",
    join: "/join#no-such-token",
    missing: "/no-such-page",
    mail: "/development/mail",
  }))
    await shoot(visitor, name, address);
  const lead = await signedIn(browser, "lead");
  const found = await addresses(lead);
  await shoot(lead, "desk", "/desk");
  await shoot(lead, "new-work", "/works/new");
  for (const [name, address] of Object.entries(found)) await shoot(lead, name, address);
  const second = await signedIn(browser, "author");
  await shoot(second, "desk-author", "/desk");
  if (found.flag) await shoot(second, "flag-author", found.flag);
  const referee = await signedIn(browser, "referee");
  await shoot(referee, "desk-referee", "/desk");
  const production = await signedIn(browser, "production");
  await shoot(production, "desk-production", "/desk");
  if (found.work) await shoot(production, "work-production", found.work);
  const administrator = await signedIn(browser, "administrator");
  for (const part of ["", "/mail", "/works", "/events"])
    await shoot(administrator, `admin${part.replace("/", "-")}`, `/admin${part}`);
} finally {
  await browser.close();
}
