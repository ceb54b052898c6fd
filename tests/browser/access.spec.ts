import AxeBuilder from "@axe-core/playwright";
import { expect, test, type Page } from "@playwright/test";

import { demoPerson, freshPage, signIn } from "./support/product";

const TAGS = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"];

/** Every page that a walk over the demo work's own links reaches, at most one of each kind. */
async function kindsOfPage(page: Page): Promise<string[]> {
  const kinds = new Map<string, string>();
  const queue = ["/desk", "/works/new"];
  const kindOf = (path: string) =>
    path
      .replace(/\?.*/, "")
      .replace(/[0-9a-f]{8}-[0-9a-f-]{27}/g, "ID")
      .replace(/\/\d+$/, "/N");
  for (let path = queue.shift(); path !== undefined; path = queue.shift()) {
    if (kinds.has(kindOf(path))) continue;
    const answer = await page.goto(path);
    if (!answer?.headers()["content-type"]?.startsWith("text/html")) continue;
    kinds.set(kindOf(path), path);
    const links = await page
      .locator("a[href^='/']")
      .evaluateAll((all) => all.map((a) => a.getAttribute("href") ?? ""));
    queue.push(...links.map((href) => href.replace(/#.*/, "")).filter((href) => !href.startsWith("/api/")));
  }
  return [...kinds.values()];
}

// Typeset formulas are checked once, by their own tests; here they would take most of the time.
const violations = async (page: Page) =>
  (await new AxeBuilder({ page }).exclude(".katex").withTags(TAGS).analyze()).violations.map(
    ({ id, nodes }) => ({
      id,
      where: nodes.map(({ target }) => target.join(" ")).slice(0, 3),
    }),
  );

test("no page fails the accessibility rules, light or dark, wide or narrow; none scrolls sideways", async ({
  browser,
}) => {
  test.setTimeout(400_000);
  const page = await freshPage(browser);
  const faults: string[] = [];
  page.on("console", (message) => {
    if (message.type() === "error" && !/404|Failed to load resource/.test(message.text()))
      faults.push(`${page.url()}: ${message.text()}`);
  });
  await signIn(page, demoPerson("lead"));
  const paths = ["/", "/about/verdicts", "/no-such-page", ...(await kindsOfPage(page))];
  expect(paths.length).toBeGreaterThan(14);
  for (const path of paths)
    for (const [theme, width] of [
      ["light", 1440],
      ["dark", 360],
    ] as const) {
      await page.setViewportSize({ width, height: 800 });
      await page.context().addCookies([{ name: "theme", value: theme, url: new URL(page.url()).origin }]);
      await page.goto(path);
      expect.soft(await violations(page), `${path} ${theme} ${width}`).toEqual([]);
      const over = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect.soft(over, `${path} is wider than ${width}`).toBeLessThanOrEqual(0);
      const title = await page.title();
      expect.soft(title, path).toMatch(/Surdmark/);
    }
  expect(faults).toEqual([]);
});
