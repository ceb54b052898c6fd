import type { Metadata } from "next";

import { Math } from "@/components/math";
import { Facts } from "@/components/ui/definition";
import { Disclosure } from "@/components/ui/disclosure";
import { PageBody, PageHeader, Section, Sheet } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { CONVENTION_CHOICES, type Conventions } from "@/lib/verify/conventions";
import { getConventions } from "@/lib/works/get-conventions";
import { conventionExamples } from "../../_components/examples";
import { ConventionsForm } from "./_components/conventions-form";

export const metadata: Metadata = { title: "Conventions sheet" };

export default async function ConventionsPage({ params }: PageProps<"/works/[workId]/conventions">) {
  const user = await requireUser();
  const view = await orNotFound(getConventions((await params).workId, user));
  return (
    <PageBody width="sheet">
      <PageHeader
        trail={[{ label: view.work.title, href: `/works/${view.work.id}` }, { label: "conventions" }]}
        title="Conventions sheet"
      >
        Version {view.version}. Every claim of the work is read and judged by it.
      </PageHeader>
      <Sheet marks className="px-6 py-7 sm:px-9">
        {view.mayEdit ? (
          <ConventionsForm
            key={view.version}
            workId={view.work.id}
            version={view.version}
            conventions={view.conventions}
            judged={view.judged}
            choices={CONVENTION_CHOICES}
            examples={conventionExamples()}
          />
        ) : (
          <Choices conventions={view.conventions} />
        )}
      </Sheet>
      {view.history.length > 1 ? (
        <Section id="history" title="Earlier versions">
          {view.history
            .filter(({ version }) => version !== view.version)
            .map(({ version, by, at, conventions }) => (
              <Disclosure
                key={version}
                summary={
                  <>
                    Version {version}, by <bdi>{by}</bdi>, <Time at={at} withClock />
                  </>
                }
              >
                <Choices conventions={conventions} />
              </Disclosure>
            ))}
        </Section>
      ) : null}
    </PageBody>
  );
}

/** A sheet as it is read: each question with the answer chosen. */
function Choices({ conventions }: { conventions: Conventions }) {
  return (
    <Facts
      items={CONVENTION_CHOICES.map(({ id, question, options }) => {
        const chosen = options.find(({ value }) => value === String(conventions[id]));
        return {
          term: question,
          value: chosen ? (
            <span className="flex flex-wrap items-center gap-x-4">
              {chosen.label} <Math latex={chosen.latex} />
            </span>
          ) : (
            String(conventions[id])
          ),
        };
      })}
    />
  );
}
