import { readFileSync } from "node:fs";
import path from "node:path";
import { expect, type Browser, type Page } from "@playwright/test";

export type DemoPerson = { name: string; email: string; password: string; role: string };

const folder = () => process.env.LOCAL_FOLDER ?? ".local";

/** A person of the demo work, with the password that this installation gave them. */
export function demoPerson(role: string, nth = 0): DemoPerson {
  const people = JSON.parse(readFileSync(path.join(folder(), "demo.json"), "utf8")) as DemoPerson[];
  const person = people.filter((one) => one.role === role)[nth];
  if (!person) throw new Error(`demo.json has no ${role} number ${nth}`);
  return person;
}

/** A browser of one's own: no cookies shared with anybody else in the test. */
export async function freshPage(browser: Browser): Promise<Page> {
  return (await browser.newContext()).newPage();
}

/** Signs in through the form, as a person would, and stands on the desk. */
export async function signIn(page: Page, person: { email: string; password: string }): Promise<void> {
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(person.email);
  await page.getByLabel("Password", { exact: true }).fill(person.password);
  await page.getByRole("button", { name: "Sign in", exact: true }).first().click();
  await expect(page).toHaveURL(/\/desk$/);
}
