import type { NextConfig } from "next";

const nextConfig: NextConfig = {
  output: "standalone",
  poweredByHeader: false,
  typedRoutes: false,
  // Types are a step of `npm test`; a build that checked them again would take a minute longer on every start after a change.
  typescript: { ignoreBuildErrors: true },
  serverExternalPackages: ["pdfmake", "nodemailer", "bwip-js", "sharp", "@node-rs/argon2"],
  outputFileTracingIncludes: { "/**": ["./modules/outbound/pdf/fonts/*"] },
  // Thumbnails are our own; the optimiser stays closed.
  images: { unoptimized: true },
  experimental: { serverActions: { bodySizeLimit: "1mb" } },
};

export default nextConfig;
