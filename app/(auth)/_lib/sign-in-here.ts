type Outcome = { ok: true } | { ok: false; message: string };

const WRONG = "The e-mail address or the password is wrong.";
const BROKEN = "Signing in does not work just now. Try again in a minute.";

/** Signs in from the browser: fetches a fresh anti-forgery token, then sends the password. */
export async function signInHere({ email, password }: { email: string; password: string }): Promise<Outcome> {
  try {
    const { csrfToken } = (await (await fetch("/api/auth/csrf")).json()) as { csrfToken: string };
    const answer = await fetch("/api/auth/callback/credentials", {
      method: "POST",
      headers: { "content-type": "application/x-www-form-urlencoded" },
      body: new URLSearchParams({ csrfToken, email, password, json: "true", callbackUrl: "/desk" }),
    });
    if (answer.ok) return { ok: true };
    if (answer.status === 429) {
      const seconds = Number(answer.headers.get("retry-after") ?? 60);
      return { ok: false, message: `Too many attempts from here. Try again in ${seconds} seconds.` };
    }
    const text = await answer.text();
    return { ok: false, message: text.includes("invalid") ? WRONG : BROKEN };
  } catch {
    return { ok: false, message: "There is no connection to the server. Check the network, then try again." };
  }
}
