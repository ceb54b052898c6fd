import { PageBody, Sheet } from "@/components/ui/page";
import { SkeletonBlock, SkeletonLines } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <div role="status" aria-label="The flag is on its way">
        <SkeletonBlock className="mb-3 h-4 w-56" />
        <SkeletonBlock className="mb-8 h-9 w-64 max-w-full" />
        <Sheet marks className="grid gap-8 p-9 md:grid-cols-[minmax(0,1fr)_16rem]">
          <div className="grid gap-6">
            <SkeletonBlock className="h-14 w-80 max-w-full" />
            <SkeletonBlock className="h-14 w-72 max-w-full" />
          </div>
          <SkeletonLines lines={4} />
        </Sheet>
      </div>
    </PageBody>
  );
}
