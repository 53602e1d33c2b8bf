"use client";
import { BrokenPage } from "@/modules/ui/broken-page";

export default function RootError({ error, retry }: { error: Error & { digest?: string }; retry: () => void }) {
  return <BrokenPage error={error} retry={retry} />;
}
