import { settingsOf } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { UploadForm } from "@/modules/flow/components/upload-form";
import { UploadPhotos } from "@/modules/flow/components/upload-photos";
import { gearOf } from "@/modules/flow/queries/sheet";
import { flowFilesOf, uploadHeads } from "@/modules/flow/queries/upload";
import { isUuid } from "@/modules/kernel/id";
import { Bay } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Readings from a file" };

export default async function UploadPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ head?: string | string[] }> }) {
  const ctx = await shopPage(params, "flow.record");
  const { head } = await searchParams;
  const headId = typeof head === "string" && isUuid(head) ? head : null;
  const [heads, gear, settings] = [await uploadHeads(ctx, headId ?? undefined), await gearOf(ctx), await settingsOf(ctx)];
  const known = headId && heads.some((h) => h.id === headId) ? headId : null;
  const attached = known ? await flowFilesOf(ctx, known) : null;
  const base = `/s/${ctx.shop.slug}/flow`;
  return (
    <main id="main" className="page">
      <PageHead title="Readings from a file" sub="A table of lifts and flows, in any order of columns." actions={<><LinkButton href={base}>Flow room</LinkButton><LinkButton href={`${base}/library`}>Library</LinkButton></>} />
      {heads.length === 0 ? <EmptyState title="No heads yet" action={<LinkButton href={`${base}/library`}>Add an own head</LinkButton>}>A head is here when its order is booked in, or when the shop adds one of its own.</EmptyState>
        : <UploadForm heads={heads} gear={gear} headId={known} nominal={settings.nominalPressureInH2O} />}
      {known && attached ? <div className="mt-7"><Bay label="Sheets and files of this head"><UploadPhotos headId={known} photos={attached.photos} files={attached.files} mayAdd /></Bay></div> : null}
    </main>
  );
}
