import { createHash } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { getSource } from "@/lib/sources/get-source";
import { getSourceBytes } from "@/lib/sources/get-source-bytes";
import { SOURCE_LIMITS } from "@/lib/sources/limits";
import { listSources } from "@/lib/sources/list-sources";
import { readUpload } from "@/lib/sources/read-upload";
import { mayReceive, receiveSource } from "@/lib/sources/receive-source";
import { AuditEvent, Source, type Chapter, type Work } from "@/models";
import { buildChapter, buildMember, buildWork } from "../../factories";

let work: Work;
let chapter: Chapter;
let author: SessionUser;

beforeAll(async () => {
  work = await buildWork();
  chapter = await buildChapter({ workId: work.id });
  author = await buildMember(work, "author");
});

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
const digestOf = (bytes: Uint8Array) => `sha-256=:${sha256(bytes).toString("base64")}:`;

/** A body that arrives in pieces, with the headers that came before it. */
function request(
  bytes: Uint8Array,
  headers: Record<string, string> = {
    "content-length": String(bytes.length),
    "content-digest": digestOf(bytes),
  },
) {
  let at = 0;
  const body = new ReadableStream<Uint8Array>({
    pull(controller) {
      if (at >= bytes.length) return controller.close();
      controller.enqueue(bytes.subarray(at, at + 65_536));
      at += 65_536;
    },
  });
  return { headers: new Headers(headers), body };
}

async function failure(promise: Promise<unknown>): Promise<AppError> {
  const error: unknown = await promise.then(
    () => new Error("it succeeded"),
    (reason: unknown) => reason,
  );
  if (error instanceof AppError) return error;
  throw error;
}

const receive = async (
  name: string,
  bytes: Uint8Array,
  user = author,
  place: { workId: string; chapterId: string } = { workId: work.id, chapterId: chapter.id },
) => receiveSource({ ...place, name, ...(await readUpload(request(bytes))) }, user);
const csv = (rows: string) => Buffer.from(`ref,quantity,claimed\n${rows}`);

describe("taking in the bytes", () => {
  it.each([-1, 0, 1])("takes 2 MiB and not one byte more (%i)", async (more) => {
    const bytes = Buffer.alloc(SOURCE_LIMITS.bytes + more, "a");
    if (more <= 0) return expect((await readUpload(request(bytes))).bytes.equals(bytes)).toBe(true);
    expect((await failure(readUpload(request(bytes)))).code).toBe("too_large");
    // A body that says nothing of its length, or lies about it, is stopped at the limit all the same.
    expect((await failure(readUpload(request(bytes, { "content-digest": digestOf(bytes) })))).code).toBe(
      "too_large",
    );
    expect((await failure(readUpload(request(bytes, { "content-length": "10" })))).code).toBe("too_large");
  });

  it("stops reading soon after the limit, however much would come", async () => {
    let given = 0;
    const body = new ReadableStream<Uint8Array>({
      pull(controller) {
        given += 65_536;
        controller.enqueue(new Uint8Array(65_536));
      },
    });
    const refused = await failure(readUpload({ headers: new Headers({ "content-length": "100" }), body }));
    expect(refused.code).toBe("too_large");
    expect(given).toBeLessThan(SOURCE_LIMITS.bytes + 4 * 65_536);
  });

  it.each([
    ["shorter than announced", { "content-length": "400" }, /announced with 400 bytes, but 300 arrived/],
    ["longer than announced", { "content-length": "200" }, /announced with 200 bytes, but 300 arrived/],
    ["another digest", { "content-digest": digestOf(Buffer.from("other")) }, /changed on its way/],
    ["an unreadable digest", { "content-digest": "sha-256=:abc:" }, /no readable sha-256/],
    ["a length that is no number", { "content-length": "1e3" }, /not a number/],
    ["neither length nor digest", {}, /neither how long/],
  ])("refuses a body with %s and keeps nothing", async (_, headers, says) => {
    const refused = await failure(readUpload(request(Buffer.alloc(300, "x"), headers)));
    expect([refused.code, refused.message]).toEqual(["invalid", expect.stringMatching(says)]);
  });

  it("refuses what breaks off or never ends", async () => {
    const broken = new ReadableStream<Uint8Array>({
      start(controller) {
        controller.enqueue(new Uint8Array(10));
        controller.error(new Error("reset"));
      },
    });
    expect(
      (await failure(readUpload({ headers: new Headers({ "content-length": "20" }), body: broken }))).message,
    ).toMatch(/broke off/);
    const silent = new ReadableStream<Uint8Array>({});
    expect(
      (await failure(readUpload({ headers: new Headers({ "content-length": "20" }), body: silent }, 30)))
        .message,
    ).toMatch(/too long/);
  });
});

describe("keeping a source", () => {
  it("keeps the bytes as they came, also when no row can be read", async () => {
    for (const bytes of [
      csv('1,"(1 1 2; 0 0 0)",1\n'),
      Buffer.from("\ufeffref;quantity;claimed\r\n"),
      Buffer.from("wrong,header\n1,2\n"),
      Buffer.from('{"claims": ['),
      Buffer.from("ref,quantity,claimed\n\xe9,1,2\n", "latin1"),
    ]) {
      const { id, same } = await receive(
        bytes.toString("latin1").startsWith("{") ? "key.json" : "key.csv",
        bytes,
      );
      expect(same).toBe(false);
      const kept = await getSourceBytes(work.id, id, author);
      expect(kept.bytes.equals(bytes)).toBe(true);
      expect(kept.sha256).toBe(sha256(bytes).toString("hex"));
      expect(await AuditEvent.count({ where: { action: "source.receive", subjectId: id } })).toBe(1);
    }
  });

  it("says in a sentence why a file cannot be read, and the file is still there", async () => {
    const { id } = await receive("broken.csv", Buffer.from("ref,quantity\n7.1,2\n"));
    const view = await getSource(work.id, id, author);
    expect([view.counts.rows, view.errors[0]?.line]).toEqual([0, 1]);
    expect(view.errors[0]?.says).toContain("lacks the column claimed");
    expect(await Source.count({ where: { id } })).toBe(1);
  });

  it("offers the same bytes in the same chapter as the same source, from twenty uploads at once as well", async () => {
    const bytes = csv("same,1,2\n");
    const all = await Promise.all(Array.from({ length: 20 }, (_, i) => receive(`name-${i}.csv`, bytes)));
    expect(new Set(all.map(({ id }) => id)).size).toBe(1);
    expect(all.filter(({ same }) => !same)).toHaveLength(1);
    expect(
      await Source.count({ where: { chapterId: chapter.id, sha256: sha256(bytes).toString("hex") } }),
    ).toBe(1);
    const elsewhere = await buildChapter({ workId: work.id });
    expect(
      (await receive("name.csv", bytes, author, { workId: work.id, chapterId: elsewhere.id })).same,
    ).toBe(false);
  });

  it.each([
    ["a PNG picture", Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a]), /PNG picture/],
    ["a ZIP archive", Buffer.from("PK\u0003\u0004rest", "latin1"), /ZIP archive or a spreadsheet/],
    ["a PDF", Buffer.from("%PDF-1.7\n"), /PDF document/],
    ["a program", Buffer.from("\u007fELF\u0002", "latin1"), /program/],
    ["UTF-16 with its mark", Buffer.from("\ufeffref,quantity,claimed\n", "utf16le"), /UTF-16/],
    ["UTF-16 without its mark", Buffer.from("ref,quantity,claimed\n", "utf16le"), /UTF-16/],
    ["a NUL byte", Buffer.from("ref,quantity,claimed\n7,\u0000,1\n"), /Byte 24 of the file is NUL/],
    ["nothing", Buffer.alloc(0), /empty/],
  ])("refuses %s by its bytes, whatever its name says", async (_, bytes, says) => {
    const before = await Source.count();
    for (const name of ["key.csv", "key.json"]) {
      const refused = await failure(receive(name, bytes));
      expect([refused.code, refused.message]).toEqual(["invalid", expect.stringMatching(says)]);
    }
    expect(await Source.count()).toBe(before);
  });

  it("does not exist for strangers, production and referees, and the ids of two works do not mix", async () => {
    const bytes = csv("secret,1,2\n");
    const { id } = await receive("key.csv", bytes);
    const other = await buildWork();
    const otherLead = await buildMember(other, "lead");
    const otherChapter = await buildChapter({ workId: other.id });
    const people = [
      await buildMember(work, "production"),
      await buildMember(work, "referee", { chapterIds: [] }),
      otherLead,
    ];
    for (const user of people) {
      const tries = [
        getSource(work.id, id, user),
        getSourceBytes(work.id, id, user),
        mayReceive(work.id, chapter.id, user),
        receive("key.csv", bytes, user),
        listSources(work.id, chapter.id, user),
      ];
      expect((await Promise.all(tries.map(failure))).map(({ code }) => code)).toEqual(
        tries.map(() => "not_found"),
      );
    }
    const referee = await buildMember(work, "referee", { chapterIds: [chapter.id] });
    expect((await failure(getSource(work.id, id, referee))).code).toBe("not_found");
    expect((await failure(receive("key.csv", bytes, referee))).code).toBe("forbidden");
    const mixed = [
      getSource(other.id, id, otherLead),
      getSourceBytes(other.id, id, otherLead),
      receive("key.csv", bytes, otherLead, { workId: other.id, chapterId: chapter.id }),
      receive("key.csv", bytes, author, { workId: work.id, chapterId: otherChapter.id }),
    ];
    expect((await Promise.all(mixed.map(failure))).map(({ code }) => code)).toEqual(
      mixed.map(() => "not_found"),
    );
  });
});
