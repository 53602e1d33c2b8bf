import { shopPage } from "@/modules/access/page";
import { FloorBoard } from "@/modules/work-orders/components/floor-board";
import { floorOf } from "@/modules/work-orders/queries/floor";

export const metadata = { title: "Floor" };

export default async function FloorPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "floor.see");
  return (
    <main id="main" className="page">
      <FloorBoard initial={await floorOf(ctx)} />
    </main>
  );
}
