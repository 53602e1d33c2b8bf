"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { CopyKey } from "@/modules/ui/copy-key";
import { ConfirmDialog } from "@/modules/ui/dialog";
import { usePlace } from "@/modules/ui/place";
import { makeBenchTokenAction } from "../actions";
import { benchTokenFrom } from "../domain/bench-token";

export interface ShownToken { readonly name: string; readonly token: string }

/** A new token, made here and sent along, so that it is in nothing the server answers or writes down. Null: refused, with the words. */
export async function newBenchToken(slug: string, id: string): Promise<ShownToken | string> {
  const token = benchTokenFrom(crypto.getRandomValues(new Uint8Array(32)));
  const reply = await makeBenchTokenAction(slug, { requestId: crypto.randomUUID(), input: { id, token } }).catch(() => null);
  if (reply?.status === "ok") return { name: reply.value.name, token };
  return reply?.status === "refused" ? reply.message : "No answer came, so no token is shown. Make a new one; it ends any other.";
}

/** The token, shown once. */
export function BenchTokenPlate({ shown, onPutAway }: { shown: ShownToken; onPutAway: () => void }) {
  return (
    <div className="plate mx-[18px] mb-4" role="status">
      <p>Token of <b>{shown.name}</b>. It is not shown again: copy it to the bench computer now.</p>
      <p className="my-3"><code className="q block break-all rounded-bay bg-well p-3 select-all">{shown.token}</code></p>
      <p className="flex flex-wrap gap-2"><CopyKey text={shown.token} what={`the token of ${shown.name}`} /><Button size="sm" variant="lo" onClick={onPutAway}>Put away</Button></p>
      <p className="mid mt-3">Whoever holds it may read sheets and write readings of this shop, and nothing else. Put the computer out of use here and the token ends at once.</p>
    </div>
  );
}

/** Makes the token of a bench computer; a second one asks first, because it ends the first. */
export function MakeToken({ device, onShown, onRefused }: { device: { id: string; name: string; hasToken: boolean }; onShown: (shown: ShownToken) => void; onRefused: (words: string) => void }) {
  const { slug } = usePlace();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [pending, setPending] = useState(false);
  const make = async () => {
    setPending(true);
    const made = await newBenchToken(slug, device.id);
    setPending(false);
    setOpen(false);
    if (typeof made === "string") onRefused(made);
    else onShown(made);
    router.refresh();
  };
  if (!device.hasToken) return <Button size="sm" pending={pending} pendingText="Making…" onClick={() => void make()}>Make token</Button>;
  return (
    <ConfirmDialog trigger={<Button size="sm">New token</Button>} open={open} onOpenChange={setOpen} question={`Make a new token for ${device.name}?`} safe="Keep the old one" action="Make a new one" pending={pending} pendingText="Making…" onAction={() => void make()}>
      The token in use ends at once, and the bench computer writes nothing until it has the new one.
    </ConfirmDialog>
  );
}
