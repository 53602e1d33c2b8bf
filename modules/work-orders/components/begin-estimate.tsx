"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { startEstimateAction } from "../actions";

/** Begins the next version as a copy of the newest. */
export function BeginEstimate({ orderId, number, label, variant = "plain" }: { orderId: string; number: string; label: string; variant?: "plain" | "go" }) {
  const { slug } = usePlace();
  const router = useRouter();
  const [pending, setPending] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const begin = async () => {
    setPending(true);
    try {
      const reply = await startEstimateAction(slug, { requestId: crypto.randomUUID(), input: { workOrderId: orderId } });
      if (reply.status === "ok") {
        router.push(`/s/${slug}/orders/${number}/estimate`);
        router.refresh();
      } else setTrouble(reply.status === "refused" || reply.status === "conflict" ? reply.message : "It was not begun. Try again.");
    } catch {
      setTrouble("No link to the shop. Nothing is lost; try again.");
    } finally {
      setPending(false);
    }
  };
  return (
    <>
      <Button variant={variant} pending={pending} pendingText="Beginning…" onClick={() => void begin()}>{label}</Button>
      {trouble ? <Note tone="stop" live>{trouble}</Note> : null}
    </>
  );
}
