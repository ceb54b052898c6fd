import { PageBody } from "@/components/ui/page";
import { SkeletonBlock, SkeletonLines } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <div role="status" aria-label="The run is on its way">
        <SkeletonBlock className="mb-3 h-4 w-40" />
        <SkeletonBlock className="mb-8 h-9 w-80 max-w-full" />
        <SkeletonBlock className="mb-6 h-2.5 w-full" />
        <div className="mb-8 grid gap-10 md:grid-cols-2">
          <SkeletonLines lines={4} />
          <SkeletonLines lines={4} />
        </div>
        <SkeletonBlock className="h-9 w-full" />
      </div>
    </PageBody>
  );
}
