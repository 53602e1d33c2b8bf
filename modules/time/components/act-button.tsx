"use client";

import { useRouter } from "next/navigation";
import { useRef, useState, type ReactNode } from "react";
import { Button, type ButtonSize, type ButtonVariant } from "@/modules/ui/button";
import { settles, type Reply } from "@/modules/ui/form/reply";
import { Icon } from "@/modules/ui/icon";
import { usePlace } from "@/modules/ui/place";

type Action = (shop: string, sent: { requestId: string; input: unknown }) => Promise<Reply<unknown>>;

/** One press that needs no form. What the shop says against it stands beside the key. */
export function ActButton({ action, input, pendingText = "Writing…", variant, size, children }: { action: Action; input: unknown; pendingText?: string; variant?: ButtonVariant; size?: ButtonSize; children: ReactNode }) {
  const { slug } = usePlace();
  const router = useRouter();
  const id = useRef<string | null>(null);
  const [pending, setPending] = useState(false);
  const [said, setSaid] = useState<string | null>(null);
  const press = async () => {
    setPending(true);
    setSaid(null);
    id.current ??= crypto.randomUUID();
    try {
      const reply = await action(slug, { requestId: id.current, input });
      if (settles(reply)) id.current = null;
      if (reply.status === "ok") router.refresh();
      else setSaid(reply.status === "refused" || reply.status === "conflict" ? reply.message : reply.status === "invalid" ? (reply.fields[0]?.message ?? "This was not taken.") : reply.status === "signed-out" ? "You are signed out. Sign in again." : `Something broke on our side. Quote ${reply.reference}.`);
    } catch {
      setSaid("No answer. Press again; it is done only once.");
    } finally {
      setPending(false);
    }
  };
  return (
    <span className="inline-flex flex-wrap items-center gap-x-3 gap-y-1">
      <Button {...(variant ? { variant } : {})} {...(size ? { size } : {})} pending={pending} pendingText={pendingText} onClick={() => void press()}>{children}</Button>
      {said ? <span className="err" role="alert"><Icon name="warn" size={16} /> {said}</span> : null}
    </span>
  );
}
