import type { Metadata } from "next";
import { cache } from "react";

import { Facts } from "@/components/ui/definition";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { openKeptMail } from "@/lib/mail/kept-mails";

type Props = PageProps<"/development/mail/[name]">;

const load = cache(async ({ params }: Props) => orNotFound(openKeptMail((await params).name)));

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: `Mail: ${(await load(props)).subject}` };
}

export default async function KeptMailPage(props: Props) {
  const { subject, from, to, at, text, html } = await load(props);
  return (
    <PageBody width="sheet">
      <PageHeader
        trail={[{ label: "outgoing mail", href: "/development/mail" }, { label: "one mail" }]}
        title={subject}
      >
        As the local mail server received it.
      </PageHeader>
      <Facts
        items={[
          { term: "From", value: from },
          { term: "To", value: to },
          { term: "Sent", value: <Time at={at} withClock /> },
        ]}
      />
      <Section id="text" title="As plain text" className="mt-10">
        <p className="font-mono text-sm leading-relaxed break-words whitespace-pre-wrap">
          <WithLinks text={text} />
        </p>
      </Section>
      {html ? (
        <Section id="html" title="As HTML">
          <iframe
            title={`The mail “${subject}” as HTML`}
            srcDoc={html.replaceAll("<a ", '<a target="_top" ')}
            sandbox="allow-top-navigation-by-user-activation"
            className="h-[34rem] w-full border border-rule bg-sheet"
          />
        </Section>
      ) : null}
    </PageBody>
  );
}

/** The text with its addresses as links. */
function WithLinks({ text }: { text: string }) {
  return text.split(/(https?:\/\/[^\s<>"]+)/).map((piece, i) =>
    i % 2 === 1 ? (
      <a key={i} className="link break-all" href={piece}>
        {piece}
      </a>
    ) : (
      piece
    ),
  );
}
