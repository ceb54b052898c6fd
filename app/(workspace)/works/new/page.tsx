import type { Metadata } from "next";

import { PageBody, PageHeader, Sheet } from "@/components/ui/page";
import { requireUser } from "@/lib/auth/session";
import { CONVENTION_CHOICES } from "@/lib/verify/conventions";
import { conventionExamples } from "../_components/examples";
import { NewWorkForm } from "./_components/new-work-form";

export const metadata: Metadata = { title: "New work" };

export default async function NewWorkPage() {
  await requireUser();
  return (
    <PageBody width="sheet">
      <PageHeader trail={[{ label: "desk", href: "/desk" }, { label: "new work" }]} title="A new work">
        A book, an exam paper or a course pack. You lead it and can hand it on; every answer here can be
        changed later.
      </PageHeader>
      <Sheet marks className="px-6 py-7 sm:px-9">
        <NewWorkForm choices={CONVENTION_CHOICES} examples={conventionExamples()} />
      </Sheet>
    </PageBody>
  );
}
