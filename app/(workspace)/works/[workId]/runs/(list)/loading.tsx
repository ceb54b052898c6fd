import { PageBody } from "@/components/ui/page";
import { SkeletonPage } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <SkeletonPage rows={6} label="The runs are on their way" />
    </PageBody>
  );
}
