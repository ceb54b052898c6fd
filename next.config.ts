import type { NextConfig } from "next";

/** On every answer, pages, files and errors alike. The policy with the nonce is the pages' own (proxy.ts). */
const everywhere = [
  { key: "X-Content-Type-Options", value: "nosniff" },
  { key: "Referrer-Policy", value: "same-origin" },
  { key: "X-Frame-Options", value: "DENY" },
  { key: "Cross-Origin-Opener-Policy", value: "same-origin" },
  { key: "Cross-Origin-Resource-Policy", value: "same-origin" },
  { key: "Permissions-Policy", value: "camera=(), geolocation=(), microphone=(), payment=(), usb=()" },
];

const config: NextConfig = {
  // The tests build into a folder of their own, beside a product that runs from the same clone.
  distDir: process.env.NEXT_DIST_DIR ?? ".next",
  typescript: {
    tsconfigPath: process.env.NEXT_TSCONFIG ?? "tsconfig.json",
    // `npm run typecheck` and `npm test` check types; a start need not wait for it.
    ignoreBuildErrors: process.env.SKIP_TYPES === "1",
  },
  poweredByHeader: false,
  productionBrowserSourceMaps: false,
  reactStrictMode: true,
  typedRoutes: false,
  // Next bundles these wrongly or not at all (they load files of their own at run time).
  serverExternalPackages: ["sequelize", "mariadb", "bull", "@node-rs/argon2", "pino"],
  images: { unoptimized: true },
  experimental: { serverActions: { bodySizeLimit: "1mb" } },
  headers: async () => [
    { source: "/:path*", headers: everywhere },
    // Data are never shown as a page, whatever they contain.
    {
      source: "/api/:path*",
      headers: [
        { key: "Content-Security-Policy", value: "default-src 'none'; frame-ancestors 'none'; sandbox" },
        { key: "Cache-Control", value: "no-store" },
      ],
    },
  ],
};

export default config;
