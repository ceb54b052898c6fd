"use client";

import { FailureScreen } from "@/components/failure-screen";

export default function ErrorPage({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset: () => void;
}) {
  return <FailureScreen digest={error.digest} onRetry={reset} />;
}
