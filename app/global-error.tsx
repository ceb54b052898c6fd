"use client";

import "./globals.css";

import { FailureScreen } from "@/components/failure-screen";

/** The last resort, when even the shell of the page failed. */
export default function GlobalError({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset: () => void;
}) {
  return (
    <html lang="en-GB">
      <body>
        <title>A fault of ours · Surdmark</title>
        <FailureScreen digest={error.digest} onRetry={reset} />
      </body>
    </html>
  );
}
