"use client";
import { BrokenPage } from "@/modules/ui/broken-page";

export default function RootError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return <BrokenPage error={error} retry={reset} />;
}
