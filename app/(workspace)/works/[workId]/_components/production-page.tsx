import Link from "next/link";

import { EmptyState } from "@/components/ui/empty-state";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { KeySeal } from "@/components/verdict-mark";
import { orNotFound } from "@/lib/action";
import type { SessionUser } from "@/lib/auth/user";
import { listKeys } from "@/lib/keys/list-keys";
import type { WorkChrome } from "@/lib/works/get-work";
import { KIND_WORDS } from "@/lib/works/schema";

/** A work as production sees it: its name and its frozen keys, nothing of what is being written. */
export async function ProductionPage({ work, user }: { work: WorkChrome; user: SessionUser }) {
  const { keys } = await orNotFound(listKeys(work.id, user));
  return (
    <PageBody>
      <PageHeader kicker={KIND_WORDS[work.kind].name} title={<bdi>{work.title}</bdi>}>
        Frozen keys, ready for print. What is still being written is for its authors.
      </PageHeader>
      {keys.length === 0 ? (
        <EmptyState title="No key is frozen yet" mark="seal">
          When the lead author freezes one, it can be downloaded here.
        </EmptyState>
      ) : (
        <Section id="keys" title="Frozen keys">
          <ul>
            {keys.map((key) => (
              <li key={key.number} className="flex items-center gap-5 border-b border-rule py-4">
                <div className="min-w-0">
                  <Link
                    href={`/works/${work.id}/keys/${key.number}`}
                    className="inline-flex min-h-11 items-center underline decoration-1 underline-offset-6 hover:decoration-2"
                  >
                    <KeySeal number={key.number} size={36} />
                  </Link>
                  <p className="font-ui text-sm text-quiet">
                    {key.claims} {key.claims === 1 ? "claim" : "claims"}, frozen by {key.frozenBy} on{" "}
                    <Time at={key.frozenAt} />
                  </p>
                </div>
              </li>
            ))}
          </ul>
        </Section>
      )}
    </PageBody>
  );
}
