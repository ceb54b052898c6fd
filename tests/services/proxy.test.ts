import { NextRequest } from "next/server";
import { afterEach, describe, expect, it, vi } from "vitest";
import { config, proxy } from "@/proxy";

const ask = (headers: Record<string, string> = {}, method = "GET") =>
  proxy(
    new NextRequest("http://localhost:3000/desk", {
      method,
      headers: { host: "localhost:3000", ...headers },
    }),
  );

const nonceOf = (response: Response) =>
  /'nonce-([^']+)'/.exec(response.headers.get("content-security-policy") ?? "")?.[1];

afterEach(() => vi.unstubAllEnvs());

describe("the content security policy", () => {
  it("has a nonce of its own on each answer, and lets no other script in", () => {
    const [one, two] = [ask(), ask()];
    expect(nonceOf(one)).toMatch(/^[A-Za-z0-9+/]{22}==$/);
    expect(nonceOf(one)).not.toBe(nonceOf(two));
    const scripts = /script-src ([^;]+)/.exec(one.headers.get("content-security-policy") ?? "")?.[1];
    expect(scripts).toBe(`'self' 'nonce-${nonceOf(one)}' 'strict-dynamic'`);
  });

  it("does not take a nonce from the visitor", () => {
    const answer = ask({ "x-nonce": "mine", "content-security-policy": "script-src 'nonce-mine'" });
    expect(nonceOf(answer)).not.toBe("mine");
    expect(answer.headers.get("x-middleware-request-x-nonce")).toBe(nonceOf(answer));
  });

  it("speaks of HTTPS only where the product is served by it", () => {
    expect(ask().headers.get("strict-transport-security")).toBeNull();
    vi.stubEnv("APP_URL", "https://keys.example.org");
    expect(ask().headers.get("strict-transport-security")).toBe("max-age=63072000; includeSubDomains");
    expect(ask().headers.get("content-security-policy")).toContain("upgrade-insecure-requests");
  });
});

describe("a write", () => {
  it.each([
    ["from our page", { "sec-fetch-site": "same-origin", origin: "http://localhost:3000" }, 200],
    ["from our page, of a browser that does not say so", { origin: "http://localhost:3000" }, 200],
    ["from another site", { "sec-fetch-site": "cross-site", origin: "https://evil.example" }, 403],
    ["from another site that hides its name", { "sec-fetch-site": "cross-site", origin: "null" }, 403],
    ["from a neighbouring site", { "sec-fetch-site": "same-site", origin: "http://a.localhost:3000" }, 403],
    ["typed by nobody", { "sec-fetch-site": "none" }, 403],
    ["from another site, of an old browser", { origin: "https://evil.example" }, 403],
    ["from nowhere", {}, 403],
    ["with a forged host", { origin: "https://evil.example", "x-forwarded-host": "evil.example" }, 403],
  ])("%s: %o gives %i", (_what, headers, status) => {
    expect(ask(headers as Record<string, string>, "POST").status).toBe(status);
  });

  it("is asked about for pages only: bodies of uploads would be cut here", () => {
    const matches = (path: string) => new RegExp(`^${config.matcher[0]}$`).test(path);
    expect(matches("/works/1/sources")).toBe(true);
    expect(matches("/api/works/1/sources")).toBe(false);
    expect(matches("/_next/static/chunks/a.js")).toBe(false);
  });
});
