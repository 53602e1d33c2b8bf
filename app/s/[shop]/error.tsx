"use client";
import { BrokenPage } from "@/modules/ui/broken-page";

export default function ShopError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return <BrokenPage error={error} retry={reset} />;
}
