"use client";
import { useParams } from "next/navigation";
import { NothingHere } from "@/modules/ui/nothing-here";

export default function ShopNotFound() {
  const { shop } = useParams<{ shop: string }>();
  return <NothingHere home={`/s/${shop}`} />;
}
