import type { Metadata, Viewport } from "next";
import "./clock.css";
import { TabletApp } from "@/modules/time/tablet/tablet-app";
import { DarkGround } from "@/modules/ui/theme";

export const metadata: Metadata = { title: "Clock" };
export const viewport: Viewport = { themeColor: "#161F1D", width: "device-width", initialScale: 1 };

/** The shop clock of an enrolled tablet. The page itself holds nothing of a shop, so that it may be kept for no link. */
export default function ClockPage() {
  return <DarkGround><TabletApp /></DarkGround>;
}
