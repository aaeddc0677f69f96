import createNextIntlPlugin from "next-intl/plugin";

const withNextIntl = createNextIntlPlugin({
  requestConfig: "./lib/i18n/request.ts",
  experimental: { createMessagesDeclaration: "./messages/en.json" },
});

/** @type {import("next").NextConfig} */
const config = {
  distDir: process.env.EBBMARK_DIST ?? ".next",
  poweredByHeader: false,
  reactStrictMode: true,
  compress: true,
  images: { unoptimized: true },
  serverExternalPackages: ["piscina", "postgres", "nodemailer"],
  turbopack: { root: import.meta.dirname },
  experimental: { serverActions: { bodySizeLimit: "1mb" } },
};

export default withNextIntl(config);
