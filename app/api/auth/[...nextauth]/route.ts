import NextAuth from "next-auth";
import { authOptions } from "@/lib/auth/options";
import { problemResponse, refuseOtherOrigins } from "@/lib/http";

type Context = { params: Promise<{ nextauth: string[] }> };

const handler = NextAuth(authOptions) as (request: Request, context: Context) => Promise<Response>;

export async function GET(request: Request, context: Context): Promise<Response> {
  return guarded(request, context);
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return guarded(request, context);
}

async function guarded(request: Request, context: Context): Promise<Response> {
  try {
    refuseOtherOrigins(request);
    return await tooMany(await handler(request, context));
  } catch (error) {
    return problemResponse(error, new URL(request.url).pathname);
  }
}

/** next-auth answers every refusal with 401; a refusal for too many attempts says so and says until when. */
async function tooMany(response: Response): Promise<Response> {
  if (response.status !== 401) return response;
  const body = await response.text();
  const seconds = /too_many(?::|%3A)(\d+)/.exec(body)?.[1];
  const headers = new Headers(response.headers);
  if (seconds) headers.set("retry-after", seconds);
  return new Response(body, { status: seconds ? 429 : 401, headers });
}
