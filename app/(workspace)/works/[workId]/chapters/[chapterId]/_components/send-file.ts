"use client";

import { SOURCE_LIMITS, sizeInWords } from "@/lib/sources/limits";
import type { Received } from "@/lib/sources/receive-source";

export type Sent = { ok: true; source: Received } | { ok: false; message: string };

/** What can be said of a file before a byte of it is sent; null when nothing speaks against it. */
export function refuseFile({ name, size }: { name: string; size: number }): string | null {
  if (!SOURCE_LIMITS.endings.some((ending) => name.toLowerCase().endsWith(ending)))
    return "A key file ends in .csv or .json.";
  if (size === 0) return "The file is empty.";
  if (size > SOURCE_LIMITS.bytes)
    return `It has ${sizeInWords(size)}; a key file may have at most ${sizeInWords(SOURCE_LIMITS.bytes)}. Divide it by problems.`;
  return null;
}

/**
 * Sends one file with its SHA-256 where the browser computes one (on https and on localhost), and tells how far it is.
 * A request of the older kind, because only that one reports progress of what is sent.
 */
export async function sendFile(
  file: File,
  place: { workId: string; chapterId: string },
  onProgress: (sent: number) => void,
  signal: AbortSignal,
): Promise<Sent> {
  let bytes: ArrayBuffer;
  try {
    bytes = await file.arrayBuffer();
  } catch {
    return {
      ok: false,
      message: "The file could not be read; it may have been moved or changed. Choose it again.",
    };
  }
  const digest = crypto.subtle ? base64(await crypto.subtle.digest("SHA-256", bytes)) : null;
  const query = new URLSearchParams({ chapter: place.chapterId, name: file.name });
  return new Promise((resolve) => {
    const request = new XMLHttpRequest();
    request.open("POST", `/api/works/${place.workId}/sources?${query.toString()}`);
    request.setRequestHeader("content-type", "application/octet-stream");
    if (digest) request.setRequestHeader("content-digest", `sha-256=:${digest}:`);
    request.responseType = "json";
    request.upload.onprogress = ({ loaded }) => onProgress(loaded);
    request.onload = () => resolve(answerOf(request));
    request.onerror = () =>
      resolve({
        ok: false,
        message: "The server could not be reached, or the line broke. Nothing was kept; try again.",
      });
    request.onabort = () => resolve({ ok: false, message: "Stopped. Nothing was kept." });
    signal.addEventListener("abort", () => request.abort());
    request.send(bytes);
  });
}

function answerOf(request: XMLHttpRequest): Sent {
  if (request.status === 200 || request.status === 201)
    return { ok: true, source: request.response as Received };
  const problem = request.response as { detail?: string } | null;
  return { ok: false, message: problem?.detail ?? `The upload was refused (${request.status}).` };
}

const base64 = (bytes: ArrayBuffer) => btoa(String.fromCharCode(...new Uint8Array(bytes)));
