import type { Metadata, Viewport } from "next";
import { connection } from "next/server";
import type { ReactNode } from "react";
import { QueryProvider } from "@/modules/ui/query-provider";
import { ToastProvider } from "@/modules/ui/toast";
import { fontClasses } from "./fonts";
import "./globals.css";

export const metadata: Metadata = {
  title: { default: "Valvekeeper", template: "%s · Valvekeeper" },
  description: "Keeps stock, keeps time, keeps the books for a cylinder-head shop.",
  robots: { index: false, follow: false },
};
export const viewport: Viewport = { themeColor: "#CAD6CF", width: "device-width", initialScale: 1 };

export default async function RootLayout({ children }: { children: ReactNode }) {
  // Every page is made per request, so that each carries its own script nonce.
  await connection();
  return (
    <html lang="en" className={fontClasses}>
      <body>
        <QueryProvider><ToastProvider>{children}</ToastProvider></QueryProvider>
      </body>
    </html>
  );
}
