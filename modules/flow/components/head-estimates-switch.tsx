"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { usePlace } from "@/modules/ui/place";
import { showFlowEstimatesAction } from "../estimate-actions";

/** The owner's switch. Off is how a shop begins. */
export function EstimatesSwitch({ on, version }: { on: boolean; version: number }) {
  const { slug } = usePlace();
  const router = useRouter();
  const [pending, setPending] = useState(false);
  const [said, setSaid] = useState("");
  const change = async () => {
    setPending(true);
    try {
      const reply = await showFlowEstimatesAction(slug, { requestId: crypto.randomUUID(), input: { show: !on, version } });
      setSaid(reply.status === "ok" ? "" : reply.status === "conflict" ? reply.message : "Not changed. Try again.");
      router.refresh();
    } catch { setSaid("Not changed: no link. Try again."); } finally { setPending(false); }
  };
  return <p className="mt-3"><Button size="sm" pending={pending} pendingText="Changing…" onClick={() => void change()}>{on ? "Switch estimates off for this shop" : "Switch estimates on for this shop"}</Button> <span role="status" className="sm">{said}</span></p>;
}
