import { PageBody } from "@/components/ui/page";
import { SkeletonPage } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody>
      <SkeletonPage rows={10} label="The key is on its way" />
    </PageBody>
  );
}
