import { PageBody } from "@/components/ui/page";
import { SkeletonPage } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <SkeletonPage rows={8} label="The review queue is on its way" />
    </PageBody>
  );
}
