// Settings of the web server. The content security policy of pages carries a nonce per request and is set in proxy.ts.
const isDevelopment = process.env.NODE_ENV === "development";

const securityHeaders = [
  { key: "X-Content-Type-Options", value: "nosniff" },
  { key: "X-Frame-Options", value: "DENY" },
  // a share link carries its token in the path: no other site may see it
  { key: "Referrer-Policy", value: "same-origin" },
  { key: "Cross-Origin-Opener-Policy", value: "same-origin" },
  { key: "Permissions-Policy", value: "camera=(), microphone=(), geolocation=(), browsing-topics=()" },
];

// A worker does not inherit the policy of its page: its script answers with one of its own.
const workerPolicy = `default-src 'none'; script-src 'self'${isDevelopment ? " 'unsafe-eval'" : ""}; connect-src 'self'`;

/** @type {import("next").NextConfig} */
const config = {
  // the tests build beside a running server, in a folder of their own
  distDir: process.env.SLACKWATER_DIST_DIR ?? ".next",
  poweredByHeader: false,
  reactStrictMode: true,
  // `npm run typecheck` looks at everything, tests included; a build for use need not do it again
  typescript: { ignoreBuildErrors: process.env.SLACKWATER_SKIP_TYPES === "1" },
  turbopack: { root: import.meta.dirname },
  experimental: {
    // above the default of 10 MB a request body is cut off, silently, on its way through proxy.ts
    proxyClientMaxBodySize: "64mb",
  },
  async headers() {
    return [
      { source: "/:path*", headers: securityHeaders },
      { source: "/_next/static/:path*", headers: [{ key: "Content-Security-Policy", value: workerPolicy }] },
    ];
  },
};

export default config;
