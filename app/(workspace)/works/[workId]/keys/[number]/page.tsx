import type { Metadata } from "next";
import { notFound } from "next/navigation";

import { Mark } from "@/components/marks";
import { DownloadButton, LinkButton } from "@/components/ui/button";
import { Facts } from "@/components/ui/definition";
import { Notice } from "@/components/ui/notice";
import { PageBody, PageHeader, Section, Sheet } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { KeySeal } from "@/components/verdict-mark";
import { CAUTIONS } from "@/components/words";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { getKey, type KeyView } from "@/lib/keys/get-key";
import { KeyNumber } from "@/lib/keys/schema";
import { CONVENTION_CHOICES } from "@/lib/verify/conventions";
import { Answers } from "./_components/answers";
import { Changes } from "./_components/changes";
import { SettledList } from "./_components/settled-list";

export async function generateMetadata({
  params,
}: PageProps<"/works/[workId]/keys/[number]">): Promise<Metadata> {
  const { number } = await params;
  return { title: KeyNumber.safeParse(number).success ? `Key ${number}` : "Key" };
}

export default async function KeyPage({ params }: PageProps<"/works/[workId]/keys/[number]">) {
  const user = await requireUser();
  const { workId, number } = await params;
  const asked = KeyNumber.safeParse(number);
  if (!asked.success) notFound();
  const key = await orNotFound(getKey(workId, asked.data, user));
  const { content } = key;
  const path = `/works/${workId}/keys`;
  return (
    <PageBody>
      <PageHeader
        trail={[
          { label: key.work.title, href: `/works/${workId}` },
          { label: "keys", href: path },
          { label: `key ${key.number}` },
        ]}
        title={<KeySeal number={key.number} size={44} className="text-2xl [&_.small-caps]:text-2xl" />}
        actions={<Downloads path={`/api/works/${workId}/keys/${key.number}`} />}
      >
        {content.work.title}, {content.claims.length} {content.claims.length === 1 ? "answer" : "answers"},
        frozen <Time at={content.frozenAt} withClock /> by {content.frozenBy}
      </PageHeader>
      {key.latest > key.number ? (
        <Notice
          kind="info"
          className="mb-6"
          title={`Key ${key.latest} is later than this one`}
          action={
            <LinkButton size="small" href={`${path}/${key.latest}`}>
              Open key {key.latest}
            </LinkButton>
          }
        >
          This key stays as it was frozen.
        </Notice>
      ) : null}
      <Sheet marks className="px-5 py-8 sm:px-9">
        <Answers content={content} />
      </Sheet>
      <SettledList content={content} />
      {key.changes && content.previous ? (
        <Changes changes={key.changes} previous={content.previous.number} />
      ) : null}
      <Section title="What it rests on" id="certificate" className="mt-12">
        <Certificate view={key} />
      </Section>
      <p className="mt-10 border-t border-rule pt-3 font-ui text-xs text-quiet">
        {CAUTIONS[0]} {CAUTIONS[3]}
      </p>
    </PageBody>
  );
}

function Downloads({ path }: { path: string }) {
  return (
    <>
      {(["latex", "csv", "json"] as const).map((format) => (
        <DownloadButton key={format} href={`${path}/${format}`} mark={<Mark name="download" size={16} />}>
          {format === "latex" ? "LaTeX" : format.toUpperCase()}
        </DownloadButton>
      ))}
    </>
  );
}

function Certificate({ view }: { view: KeyView }) {
  const { content, sha256, intact } = view;
  const choices: Record<string, unknown> = content.conventions;
  return (
    <Facts
      items={[
        {
          term: "SHA-256",
          value: (
            <>
              <code className="font-mono text-xs break-all">{sha256}</code>
              <span className={intact ? "block text-green" : "block text-red"}>
                {intact
                  ? "computed again just now from what is stored: the same"
                  : "what is stored no longer has this hash"}
              </span>
            </>
          ),
        },
        {
          term: "Hashed",
          value: "the canonical JSON (RFC 8785) of the key without the members sha256 and export",
        },
        ...(content.previous
          ? [
              {
                term: "Key before",
                value: `key ${content.previous.number}, ${content.previous.sha256.slice(0, 16)}…`,
              },
            ]
          : []),
        { term: "Recomputed by", value: `${content.engine}, two routes` },
        ...CONVENTION_CHOICES.map((choice) => ({
          term: CONVENTION_NAMES[choice.id],
          value:
            choice.options.find(({ value }) => value === String(choices[choice.id]))?.label ??
            String(choices[choice.id]),
        })),
        { term: "Conventions sheet", value: `version ${content.conventionsVersion}` },
      ]}
    />
  );
}

const CONVENTION_NAMES = {
  cgOrder: "Order of a coefficient",
  phase: "Phase",
  houseForm: "House form",
  impliedRoot: "Root understood",
  decimalMark: "Decimal mark",
} as const;
