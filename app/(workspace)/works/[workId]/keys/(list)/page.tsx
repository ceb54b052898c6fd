import type { Metadata } from "next";
import Link from "next/link";

import { KeySeal } from "@/components/verdict-mark";
import { EmptyState } from "@/components/ui/empty-state";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { CAUTIONS } from "@/components/words";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { listKeys, type KeyLine } from "@/lib/keys/list-keys";
import { FreezePanel } from "../_components/freeze-panel";
import { PreflightList } from "../_components/preflight-list";

export const metadata: Metadata = { title: "Keys" };

export default async function KeysPage({ params }: PageProps<"/works/[workId]/keys">) {
  const user = await requireUser();
  const { workId } = await params;
  const { work, keys, preflight, may } = await orNotFound(listKeys(workId, user));
  return (
    <PageBody>
      <PageHeader trail={[{ label: work.title, href: `/works/${workId}` }, { label: "keys" }]} title="Keys">
        A frozen key is what leaves the house: numbered, hashed, and never changed.
      </PageHeader>
      {preflight ? (
        <Section
          title={`Preflight for key ${preflight.number}`}
          id="preflight"
          aside={standing(preflight.fit, preflight.claims)}
        >
          <PreflightList workId={workId} preflight={preflight} mayWaive={may.waive} />
          {may.freeze ? (
            <FreezePanel
              workId={workId}
              number={preflight.number}
              claims={preflight.claims}
              ready={preflight.ready}
            />
          ) : preflight.ready ? (
            <p className="mt-5 text-quiet">A lead author can freeze key {preflight.number} now.</p>
          ) : null}
        </Section>
      ) : null}
      <Section
        title="Frozen"
        id="frozen"
        aside={keys.length > 0 ? `${keys.length} ${keys.length === 1 ? "key" : "keys"}` : null}
      >
        {keys.length === 0 ? (
          <EmptyState title="No key has been frozen yet" mark="seal">
            {preflight
              ? "When preflight finds nothing more to do, a lead author freezes the first."
              : "It will be here as soon as a lead author has frozen it."}
          </EmptyState>
        ) : (
          <ul>
            {keys.map((key) => (
              <KeyEntry key={key.number} workId={workId} line={key} />
            ))}
          </ul>
        )}
      </Section>
      <p className="mt-10 border-t border-rule pt-3 font-ui text-xs text-quiet">
        {CAUTIONS[1]} {work.confidential ? CAUTIONS[3] : CAUTIONS[0]}
      </p>
    </PageBody>
  );
}

const standing = (fit: number, claims: number) =>
  claims === 0
    ? "no claims yet"
    : fit === claims
      ? `all ${claims} claims are fit`
      : `${fit} of ${claims} claims are fit`;

function KeyEntry({ workId, line }: { workId: string; line: KeyLine }) {
  return (
    <li className="grid gap-x-8 gap-y-1 border-b border-rule py-4 sm:grid-cols-[14rem_minmax(0,1fr)] sm:items-center">
      <Link
        href={`/works/${workId}/keys/${line.number}`}
        className="no-underline hover:underline hover:underline-offset-4"
      >
        <KeySeal number={line.number} size={34} />
      </Link>
      <div className="min-w-0">
        <p>
          {line.claims} {line.claims === 1 ? "answer" : "answers"}, frozen{" "}
          <Time at={line.frozenAt} withClock /> by {line.frozenBy}
        </p>
        <p className="font-mono text-xs break-all text-quiet">
          <span className="font-ui">SHA-256</span> {line.sha256}
        </p>
      </div>
    </li>
  );
}
