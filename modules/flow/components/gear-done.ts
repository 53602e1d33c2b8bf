"use client";

import { useRouter } from "next/navigation";
import { useCallback } from "react";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";

/** After gear was written: said, and back to its list, which is read again. */
export function useGearDone(view: string): (said: string) => void {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  return useCallback((said: string) => {
    toast({ text: said });
    router.replace(`/s/${slug}/flow/gear?view=${view}`);
    router.refresh();
  }, [router, slug, toast, view]);
}

/** A stored number as it stands in a field; empty when there is none. */
export const fieldText = (value: number | null | undefined): string => (value === null || value === undefined ? "" : String(value));
/** A stored lift as it stands in a field, mm. */
export const liftField = (um: number | null | undefined): string => (um === null || um === undefined ? "" : String(um / 1000));
