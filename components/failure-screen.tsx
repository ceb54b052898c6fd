"use client";

import { Button } from "@/components/ui/button";

/** Something failed while a page was made: what happened, that nothing typed elsewhere is lost, and the ways on. */
export function FailureScreen({ digest, onRetry }: { digest?: string; onRetry: () => void }) {
  return (
    <div className="mx-auto max-w-measure px-6 py-16">
      <div className="border-l-3 border-double border-red pl-6" role="alert">
        <p className="small-caps text-lg text-red">a fault of ours</p>
        <h1 className="text-2xl">This page could not be made</h1>
        <p className="mt-2 text-quiet">
          Something failed on our side. What was saved before is kept. Try again; if it fails once more, send
          the reference below to whoever runs this site.
        </p>
        {digest ? (
          <p className="mt-3 font-ui text-sm">
            Reference <code className="font-mono">{digest}</code>
          </p>
        ) : null}
        <div className="mt-5 flex flex-wrap items-center gap-x-6 gap-y-3 font-ui text-sm">
          <Button variant="primary" onClick={onRetry}>
            Try again
          </Button>
          {/* A plain anchor: after a failure the whole page is asked for anew. */}
          <a href="/desk" className="link inline-flex min-h-8 items-center">
            To your desk
          </a>
        </div>
      </div>
    </div>
  );
}
