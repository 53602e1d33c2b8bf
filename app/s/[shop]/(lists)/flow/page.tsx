import { redirect } from "next/navigation";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { FlowRoom } from "@/modules/flow/components/flow-room";
import { TagStart } from "@/modules/flow/components/tag-start";
import { roomInput } from "@/modules/flow/input";
import { headOfTag, roomPage } from "@/modules/flow/queries/room";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Flow" };

export default async function FlowRoomPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const { tag } = await searchParams;
  const at = `/s/${ctx.shop.slug}/flow`;
  const asked = typeof tag === "string" ? tag.slice(0, 40).trim() : "";
  const found = asked === "" ? null : await headOfTag(ctx, asked);
  if (found) redirect(`${at}/${found}`);
  return (
    <main id="main" className="page">
      <PageHead title="Flow" sub="Heads on the bench, waiting for it, and proved." close actions={<>
        <LinkButton href={`${at}/gear`} variant="lo" size="sm">Benches and gear</LinkButton>
        <LinkButton href={`${at}/library`} variant="lo" size="sm">Library</LinkButton>
        <LinkButton href={`${at}/workings`} variant="lo" size="sm">Workings</LinkButton>
        {ableTo(ctx, "flow.record") ? <><LinkButton href={`${at}/upload`} variant="lo" size="sm">Read from a file</LinkButton><LinkButton href={`${at}/ladder`} variant="lo" size="sm">Ladder for paper</LinkButton></> : null}
        {ableTo(ctx, "flow.record") ? <TagStart at={at} missing={asked} /> : null}
      </>} />
      <FlowRoom first={await roomPage(ctx, roomInput.parse({}))} />
    </main>
  );
}
