"use client";
import { useState } from "react";
import { money } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { TextLink } from "@/modules/ui/text-link";
import { useAct } from "@/modules/ui/use-act";
import { askInvoicePaymentAction } from "../actions";

/** For a customer at the counter with a card: makes the provider's page for what is open, and shows where it is. */
export function CardPageKey({ invoiceId }: { invoiceId: string }) {
  const place = usePlace();
  const [page, setPage] = useState<{ url: string | null; amountMinor: number } | null>(null);
  const act = useAct(askInvoicePaymentAction.bind(null, place.slug), setPage);
  return (
    <div className="border-b border-line pb-3">
      <Button size="sm" variant="lo" icon="lock" pending={act.pending} pendingText="Making the page…" onClick={() => void act.run({ invoiceId })}>Card page</Button>
      <div aria-live="polite">
        {page?.url ? <p className="sm mt-2">{money(page.amountMinor, place)}: <TextLink href={page.url} newTab>payment page</TextLink>. The customer types the card there, not we.</p> : null}
        {page && !page.url ? <p className="sm mt-2">The provider is slow. Press again in a moment; nothing is asked twice.</p> : null}
      </div>
      {act.trouble ? <Note tone="stop" live>{act.trouble.text}</Note> : null}
    </div>
  );
}
