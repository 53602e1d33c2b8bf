"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import { Button } from "@/modules/ui/button";
import { ConfirmDialog } from "@/modules/ui/dialog";
import { usePlace } from "@/modules/ui/place";
import { leaveShopAction } from "../actions";

/** A person leaves the shop: asked once, in words. */
export function LeaveButton({ id, name }: { id: string; name: string }) {
  const { slug } = usePlace();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [pending, setPending] = useState(false);
  const requestId = useRef(crypto.randomUUID());
  const end = async () => {
    setPending(true);
    await leaveShopAction(slug, { requestId: requestId.current, input: { id } }).catch(() => null);
    setPending(false);
    setOpen(false);
    router.refresh();
  };
  return (
    <ConfirmDialog trigger={<Button variant="lo">Has left the shop</Button>} open={open} onOpenChange={setOpen} question={`Has ${name} left the shop?`} safe="Still here" action="Has left" pending={pending} pendingText="Ending…" onAction={() => void end()}>
      Badge, PIN and sign-in to this shop end at once. Name and hours stay, and hours can still be put right.
    </ConfirmDialog>
  );
}
