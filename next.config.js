/** @type {import("next").NextConfig} */
export default {
  poweredByHeader: false,
  reactStrictMode: true,
  // Types are checked once, with the tests', by `npm test`; a second check here only makes the demo wait.
  typescript: { ignoreBuildErrors: true },
  // Loaded by Node itself: a compiled driver cannot be bundled.
  serverExternalPackages: ["better-sqlite3", "@prisma/client", "@prisma/adapter-better-sqlite3"],
  headers() {
    return [
      {
        source: "/:path*",
        // The content security policy, which needs a fresh nonce for each page, is set by proxy.ts.
        headers: [
          { key: "X-Content-Type-Options", value: "nosniff" },
          { key: "X-Frame-Options", value: "DENY" },
          { key: "Referrer-Policy", value: "same-origin" },
          { key: "Cross-Origin-Opener-Policy", value: "same-origin" },
          { key: "Permissions-Policy", value: "camera=(), microphone=(), geolocation=()" },
        ],
      },
    ];
  },
};
