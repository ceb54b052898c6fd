import { PageBody } from "@/components/ui/page";
import { SkeletonPage } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <SkeletonPage rows={5} label="The people are on their way" />
    </PageBody>
  );
}
