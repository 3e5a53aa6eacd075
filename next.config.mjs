const everywhere = [
  { key: "X-Content-Type-Options", value: "nosniff" },
  { key: "Referrer-Policy", value: "no-referrer" },
  { key: "Cross-Origin-Resource-Policy", value: "same-origin" },
  { key: "X-Frame-Options", value: "DENY" },
  { key: "Permissions-Policy", value: "camera=(self), microphone=(), geolocation=()" },
];

/** @type {import("next").NextConfig} */
const config = {
  serverExternalPackages: ["sequelize", "mariadb", "@node-rs/argon2", "archiver", "nodemailer", "piscina", "pdfkit"],
  poweredByHeader: false,
  // types are a step of their own in npm test; a workshop's first start need not wait for them
  typescript: { ignoreBuildErrors: true },
  // The image optimiser is switched off: nothing here needs it and it has carried remote faults before.
  images: { unoptimized: true },
  // a browser asks for this name by itself when the page's own line comes late
  rewrites: async () => [{ source: "/favicon.ico", destination: "/icon.svg" }],
  async headers() {
    return [
      { source: "/:path*", headers: everywhere },
      // API answers never run as pages; the proxy (which sets the pages' policy) does not cover them.
      { source: "/api/:path*", headers: [
        { key: "Content-Security-Policy", value: "default-src 'none'; frame-ancestors 'none'; sandbox" },
        { key: "Cache-Control", value: "no-store" },
      ] },
      // the same for everybody, and nothing of the workshop in it
      ...["/api/openapi.json", "/openapi.json"].map((source) => ({ source, headers: [{ key: "Cache-Control", value: "public, max-age=300" }] })),
    ];
  },
};

export default config;
