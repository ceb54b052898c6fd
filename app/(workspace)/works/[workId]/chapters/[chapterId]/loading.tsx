import { PageBody } from "@/components/ui/page";
import { SkeletonBlock, SkeletonLines } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <div role="status" aria-label="The galley is on its way">
        <SkeletonBlock className="mb-3 h-4 w-40" />
        <SkeletonBlock className="mb-8 h-9 w-80 max-w-full" />
        <SkeletonBlock className="mb-10 h-9" />
        <div aria-hidden="true" className="sheet grid gap-8 px-9 py-8">
          {[0, 1, 2, 3].map((i) => (
            <div key={i} className="galley-line">
              <SkeletonLines lines={3} className="galley-text" />
              <SkeletonLines lines={2} className="galley-notes" />
            </div>
          ))}
        </div>
      </div>
    </PageBody>
  );
}
