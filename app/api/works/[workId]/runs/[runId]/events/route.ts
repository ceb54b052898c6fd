import { getUser } from "@/lib/auth/session";
import { AppError, notFound } from "@/lib/errors";
import { route } from "@/lib/http";
import { log } from "@/lib/log";
import { isGoing } from "@/lib/runs/going";
import { ThisRun } from "@/lib/runs/schema";
import { isSignedIn, watchRun, type RunNews } from "@/lib/runs/watch-run";

export const dynamic = "force-dynamic";

const LOOK_EVERY_MS = 700;
const ALIVE_EVERY_MS = 15_000;
/** The browser comes back by itself after this; the address of the sign-in is then checked from the start. */
const LONGEST_MS = 15 * 60_000;
/** After an ending of ours, the browser waits this long before it comes back. */
const COME_BACK_MS = 2_000;

/** The progress of a run as server-sent events: `news` whenever something is new, `over` when the run is. */
export const GET = route(
  async (request: Request, { params }: RouteContext<"/api/works/[workId]/runs/[runId]/events">) => {
    const user = await getUser();
    const which = ThisRun.safeParse(await params);
    if (!user || !which.success) throw notFound();
    const watch = watchRun(which.data, user, readMoment(request));
    const first = await watch.look(); // before the answer begins: what is not there is a plain 404

    const text = new TextEncoder();
    const stream = new ReadableStream<Uint8Array>({
      async start(controller) {
        const send = (lines: string) => controller.enqueue(text.encode(`${lines}\n\n`));
        const ends = Date.now() + LONGEST_MS;
        let quietSince = Date.now();
        try {
          send(`retry: ${COME_BACK_MS}`);
          for (let news = first; ; news = await watch.look()) {
            if (news) send(eventOf(news));
            if (news && !isGoing(news.progress.state)) {
              send("event: over\ndata: {}");
              break;
            }
            if (news) quietSince = Date.now();
            else if (Date.now() - quietSince > ALIVE_EVERY_MS) {
              send(": alive");
              quietSince = Date.now();
            }
            await pause(request.signal);
            if (request.signal.aborted || globalThis.surdmarkStopping || Date.now() > ends) break;
            if (!(await isSignedIn(user))) break;
          }
        } catch (error) {
          // Somebody who may no longer read it is cut off; the next request answers 404. A fault ends the stream, too.
          if (!(error instanceof AppError) && !request.signal.aborted)
            log.warn({ error }, "a stream of a run ended");
        } finally {
          close(controller);
        }
      },
    });
    return new Response(stream, {
      headers: {
        "content-type": "text/event-stream; charset=utf-8",
        "cache-control": "no-store, no-transform",
        "x-accel-buffering": "no",
        "x-content-type-options": "nosniff",
      },
    });
  },
);

const eventOf = ({ id, ...news }: RunNews) => `id: ${id}\nevent: news\ndata: ${JSON.stringify(news)}`;

/** Where to go on: after a broken connection the browser says it, before that the page does. */
function readMoment(request: Request): Date | null {
  const said = request.headers.get("last-event-id") ?? new URL(request.url).searchParams.get("since");
  const moment = said !== null && /^\d{4}-[\d:.TZ-]{6,24}$/.test(said) ? new Date(said) : null;
  return moment && !Number.isNaN(moment.getTime()) ? moment : null;
}

function pause(signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const end = () => {
      clearTimeout(timer);
      signal.removeEventListener("abort", end);
      resolve();
    };
    const timer = setTimeout(end, LOOK_EVERY_MS);
    signal.addEventListener("abort", end);
  });
}

function close(controller: ReadableStreamDefaultController): void {
  try {
    controller.close();
  } catch {
    // The browser had already gone.
  }
}
