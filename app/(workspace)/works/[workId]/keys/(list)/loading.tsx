import { PageBody } from "@/components/ui/page";
import { SkeletonPage } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <SkeletonPage rows={5} label="The keys are on their way" />
    </PageBody>
  );
}
