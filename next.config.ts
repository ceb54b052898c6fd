import type { NextConfig } from "next";

const config: NextConfig = {
  poweredByHeader: false,
  productionBrowserSourceMaps: false,
  reactStrictMode: true,
  typedRoutes: false,
  // Next bundles these wrongly or not at all (they load files of their own at run time).
  serverExternalPackages: ["sequelize", "mariadb", "bull", "@node-rs/argon2", "pino"],
  images: { unoptimized: true },
  experimental: { serverActions: { bodySizeLimit: "1mb" } },
};

export default config;
