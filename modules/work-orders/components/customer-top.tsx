import { Icon } from "@/modules/ui/icon";
import { Mark } from "@/modules/ui/mark";

/** Head of a page a customer opens: the shop and a key that calls it. */
export function CustomerTop({ shop, phone }: { shop: string; phone: string }) {
  return (
    <header className="cust-top">
      <Mark width={34} />
      <b>{shop}</b>
      {phone ? <a href={`tel:${phone}`} aria-label={`Call ${shop}`}><Icon name="call" size={22} /></a> : null}
    </header>
  );
}
