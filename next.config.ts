import type { NextConfig } from "next";

const nextConfig: NextConfig = {
  output: "standalone",
  poweredByHeader: false,
  typedRoutes: false,
  serverExternalPackages: ["pdfmake", "nodemailer", "bwip-js", "sharp", "@node-rs/argon2"],
  outputFileTracingIncludes: { "/**": ["./modules/outbound/pdf/fonts/*"] },
  // Thumbnails are our own; the optimiser stays closed.
  images: { unoptimized: true },
  experimental: { serverActions: { bodySizeLimit: "1mb" } },
};

export default nextConfig;
