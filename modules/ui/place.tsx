"use client";
import { createContext, use, type ReactNode } from "react";

/** Where the page is: the shop's address part, and how its numbers, money and hours are written. */
export interface PlaceFacts { readonly slug: string; readonly locale: string; readonly currency: string; readonly zone: string }

const PlaceContext = createContext<PlaceFacts | null>(null);

export const PlaceProvider = ({ place, children }: { place: PlaceFacts; children: ReactNode }) => <PlaceContext value={place}>{children}</PlaceContext>;

/** @throws outside a shop's pages */
export function usePlace(): PlaceFacts {
  const place = use(PlaceContext);
  if (!place) throw new Error("usePlace outside a PlaceProvider");
  return place;
}
