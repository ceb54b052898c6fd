import { PageBody } from "@/components/ui/page";
import { SkeletonPage } from "@/components/ui/skeleton";

export default function Loading() {
  return (
    <PageBody width="sheet">
      <SkeletonPage rows={6} label="The conventions sheet is on its way" />
    </PageBody>
  );
}
