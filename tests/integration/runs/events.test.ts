import { expect, it, vi } from "vitest";
import { Session } from "@/models";
import type { SessionUser } from "@/lib/auth/user";
import { Outbox } from "@/models";
import { workOn } from "@/lib/jobs/work";
import { cancelRun } from "@/lib/runs/cancel-run";
import { startRun } from "@/lib/runs/start-run";
import type { RunNews } from "@/lib/runs/watch-run";
import { GET } from "@/app/api/works/[workId]/runs/[runId]/events/route";
import { asUser, buildMember, buildSession, buildUser, buildWork } from "../../factories";
import { buildScene, handlers, manyClaims, workOff, writeClaims } from "./setup";

// Who asks: everything behind the cookie is tested elsewhere.
let asking: SessionUser | null = null;
vi.mock("@/lib/auth/session", () => ({ getUser: () => Promise.resolve(asking) }));

type Sent = { id: string; event: string; data: string };

async function signIn(user: SessionUser): Promise<SessionUser> {
  return { ...user, sessionId: (await buildSession(user.id)).id };
}

async function ask(
  which: { workId: string; runId: string },
  more: { since?: string; lastEventId?: string } = {},
) {
  const url = new URL(`http://localhost:3000/api/works/${which.workId}/runs/${which.runId}/events`);
  if (more.since) url.searchParams.set("since", more.since);
  const gone = new AbortController();
  const request = new Request(url, {
    signal: gone.signal,
    ...(more.lastEventId && { headers: { "last-event-id": more.lastEventId } }),
  });
  return { response: await GET(request, { params: Promise.resolve(which) }), leave: () => gone.abort() };
}

/** Reads events as a browser does, until the stream ends or enough have come. */
async function* events(response: Response): AsyncGenerator<Sent> {
  const decoder = new TextDecoder();
  let text = "";
  for await (const piece of response.body as unknown as AsyncIterable<Uint8Array>) {
    text += decoder.decode(piece, { stream: true });
    for (let end = text.indexOf("\n\n"); end >= 0; end = text.indexOf("\n\n")) {
      const field = (name: string) => new RegExp(`^${name}: (.*)$`, "m").exec(text.slice(0, end))?.[1] ?? "";
      const sent = { id: field("id"), event: field("event"), data: field("data") };
      text = text.slice(end + 2);
      if (sent.event) yield sent;
    }
  }
}

const newsOf = ({ data }: Sent) => JSON.parse(data) as Omit<RunNews, "id">;

it("tells how a run goes, claim by claim, and ends with it", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(110));
  const { runId } = await startRun(scene, scene.lead);
  asking = await signIn(scene.author);
  const { response } = await ask({ workId: scene.workId, runId });
  expect(response.headers.get("content-type")).toMatch(/^text\/event-stream/);
  expect(response.headers.get("cache-control")).toContain("no-store");
  const work = workOff();
  const all: Sent[] = [];
  for await (const sent of events(response)) all.push(sent);
  await work;
  expect(all.at(-1)?.event).toBe("over");
  const news = all.filter(({ event }) => event === "news").map(newsOf);
  expect(news[0]?.progress).toMatchObject({ state: "queued", done: 0, total: 110 });
  expect(news.at(-1)?.progress).toMatchObject({ state: "ended", done: 110 });
  expect(new Set(news.flatMap(({ cells }) => cells.map(([id]) => id))).size).toBe(110);
  expect(new Set(news.flatMap(({ found }) => found.map(({ id }) => id))).size).toBe(11);
});

it("loses nothing when the connection breaks in between", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(100));
  const { runId } = await startRun(scene, scene.lead);
  asking = await signIn(scene.lead);
  const seen = new Set<string>();
  const first = await ask({ workId: scene.workId, runId });
  const [batch] = await Outbox.findAll({ where: { kind: "run-batch", state: "pending" }, limit: 1 });
  await workOn(batch?.id ?? "", handlers, new AbortController().signal);
  let last = "";
  for await (const sent of events(first.response)) {
    for (const [id] of newsOf(sent).cells) seen.add(id);
    last = sent.id;
    if (seen.size === 50) break;
  }
  first.leave();
  await workOff();
  const second = await ask({ workId: scene.workId, runId }, { lastEventId: last });
  for await (const sent of events(second.response))
    if (sent.event === "news") for (const [id] of newsOf(sent).cells) seen.add(id);
  expect(seen.size).toBe(100);
});

it("is not there for a stranger, for production, for nobody, or under another work", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(2));
  const { runId } = await startRun(scene, scene.lead);
  const work = { id: scene.workId } as Parameters<typeof buildMember>[0];
  const which = { workId: scene.workId, runId };
  for (const user of [asUser(await buildUser()), await buildMember(work, "production"), null]) {
    asking = user && (await signIn(user));
    const { response } = await ask(which);
    expect(response.status).toBe(404);
    expect(response.headers.get("content-type")).toBe("application/problem+json");
  }
  asking = await signIn(scene.lead);
  const elsewhere = await buildWork({ createdById: scene.lead.id });
  expect((await ask({ workId: elsewhere.id, runId })).response.status).toBe(404);
  expect((await ask({ workId: "x", runId })).response.status).toBe(404);
});

it("ends at once when the sign-in behind it is ended", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(2));
  const { runId } = await startRun(scene, scene.lead);
  asking = await signIn(scene.author);
  const { response } = await ask({ workId: scene.workId, runId });
  const heard: string[] = [];
  for await (const { event } of events(response)) {
    heard.push(event);
    await Session.update({ revokedAt: new Date() }, { where: { id: asking.sessionId } });
  }
  expect(heard).toEqual(["news"]);
  await cancelRun({ workId: scene.workId, runId }, scene.lead);
});
