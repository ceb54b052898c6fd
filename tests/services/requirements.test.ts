import { chmodSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { faultsOf } from "@/lib/database-check";
import { find } from "../../scripts/services/find.mjs";
import { packagesMatch, sourceHash } from "../../scripts/services/packages.mjs";
import { explain } from "../../scripts/services/report.mjs";
import { packagesToInstall, requireSpace } from "../../scripts/services/requirements.mjs";
import { isDemo, portOf, processEnvironment } from "../../scripts/services/settings.mjs";

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "surdmark-requirements-"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe("programs", () => {
  it("are found on PATH and beyond, when they may be run", () => {
    const one = path.join(folder, "one");
    const two = path.join(folder, "two");
    for (const place of [one, two]) mkdirSync(place);
    writeFileSync(path.join(one, "redis-server"), "");
    chmodSync(path.join(one, "redis-server"), 0o600);
    writeFileSync(path.join(two, "redis-server"), "");
    chmodSync(path.join(two, "redis-server"), 0o700);
    expect(find("redis-server", `${one}${path.delimiter}${two}`, [])).toBe(path.join(two, "redis-server"));
    expect(find("redis-server", one, [two])).toBe(path.join(two, "redis-server"));
    expect(find("redis-server", one, [])).toBeNull();
  });

  it("that are missing become Debian packages for root", () => {
    expect(packagesToInstall(["mariadb", "redis"], () => null, true)).toEqual([
      "mariadb-server-core",
      "mariadb-client-core",
      "redis-server",
    ]);
    expect(packagesToInstall(["mariadb", "redis"], () => "/usr/bin/there", false)).toEqual([]);
  });

  it("that are missing become one sentence for anybody else", () => {
    expect(() => packagesToInstall(["mariadb", "redis"], () => null, false)).toThrow(
      'MariaDB and Redis cannot be found on this machine: install with "sudo apt-get install mariadb-server-core ' +
        'mariadb-client-core redis-server", or set DATABASE_URL and REDIS_URL to servers of your own, and start again.',
    );
    expect(() => packagesToInstall(["chromium"], () => null, false)).toThrow(
      'Chromium cannot be found on this machine: install with "sudo apt-get install chromium", and start again.',
    );
  });
});

describe("the disk", () => {
  it("is refused with a sentence when almost full", () => {
    expect(() => requireSpace("/somewhere", 1500, 120)).toThrow(
      "The disk that holds /somewhere is almost full (120 MB free, 1500 MB needed): free some space and start again.",
    );
  });

  it("that fills up meanwhile gives the same advice", () => {
    const full = Object.assign(new Error("write"), { code: "ENOSPC" });
    expect(explain(full, "/somewhere").message).toBe(
      "The disk that holds /somewhere is full: free some space and start again.",
    );
  });
});

describe("packages", () => {
  const write = (name: string, packages: Record<string, object>) => {
    mkdirSync(path.dirname(path.join(folder, name)), { recursive: true });
    writeFileSync(path.join(folder, name), JSON.stringify({ packages }));
  };

  it("match when everything locked is there, save what is optional", () => {
    write("package-lock.json", { "": {}, a: { version: "1.0.0" }, b: { version: "2.0.0", optional: true } });
    expect(packagesMatch(folder)).toBe(false);
    write("node_modules/.package-lock.json", { a: { version: "1.0.0" } });
    expect(packagesMatch(folder)).toBe(true);
    write("node_modules/.package-lock.json", { a: { version: "1.0.1" } });
    expect(packagesMatch(folder)).toBe(false);
  });
});

describe("the sources' hash", () => {
  it("changes with a name or a content, and with nothing else", () => {
    mkdirSync(path.join(folder, "app"));
    writeFileSync(path.join(folder, "app/page.tsx"), "one");
    const first = sourceHash(folder);
    writeFileSync(path.join(folder, "notes.txt"), "anything");
    expect(sourceHash(folder)).toBe(first);
    writeFileSync(path.join(folder, "app/page.tsx"), "two");
    expect(sourceHash(folder)).not.toBe(first);
  });
});

describe("settings", () => {
  it.each([
    [{}, true],
    [{ PORT: "4000", REDIS_URL: "redis://h" }, true],
    [{ APP_URL: "http://localhost:4000" }, true],
    [{ APP_URL: "https://keys.example.org" }, false],
    [{ DATABASE_URL: "mariadb://a:b@h/d" }, false],
    [{ SMTP_URL: "smtp://h" }, false],
    [{ DATABASE_URL: "mariadb://a:b@h/d", SURDMARK_DEMO: "1" }, true],
    [{ SURDMARK_DEMO: "0" }, false],
  ])("%o: demo is %s", (env, demo) => {
    expect(isDemo(env)).toBe(demo);
  });

  it("keep what a person gave and fill in the rest", () => {
    const env = processEnvironment(
      { REDIS_URL: "redis://mine", MAIL_FROM: "me@example.org" },
      {
        dev: false,
        demo: true,
        port: 4000,
        own: { REDIS_URL: "redis://own", DATABASE_URL: "mariadb://own" },
      },
    );
    expect(env).toMatchObject({
      REDIS_URL: "redis://mine",
      DATABASE_URL: "mariadb://own",
      MAIL_FROM: "me@example.org",
      APP_URL: "http://localhost:4000",
      NODE_ENV: "production",
      SURDMARK_DEMO: "1",
    });
  });

  it("read the port", () => {
    expect(portOf({})).toBe(3000);
    expect(portOf({ PORT: "4000" })).toBe(4000);
    expect(() => portOf({ PORT: "70000" })).toThrow("PORT must be a whole number");
  });
});

describe("the database's settings", () => {
  const sound = { flush: 1, doublewrite: 1, mode: "STRICT_ALL_TABLES", files: 0 };

  it.each([
    [{}, 0],
    [{ flush: 3 }, 0],
    [{ flush: 2 }, 1],
    [{ flush: 0, doublewrite: "OFF" }, 2],
    [{ mode: "" }, 1],
    [{ files: "ON" }, 1],
  ])("%o: %i faults", (change, count) => {
    expect(faultsOf({ ...sound, ...change })).toHaveLength(count);
  });
});
