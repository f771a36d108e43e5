import type { Metadata, Viewport } from "next";
import { cookies, headers } from "next/headers";
import type { ReactNode } from "react";
import { StyleNonce } from "@/components/ui/style-nonce";
import { NONCE_HEADER } from "@/lib/server/request";
import { THEME_COOKIE, themeOf, themeScript } from "@/components/shell/theme";
import "./globals.css";

export const metadata: Metadata = {
  title: { default: "Slackwater", template: "%s · Slackwater" },
  description: "Simulate an H-bridge and its current sensing: what each shunt and each output reads beside the true motor current.",
};

export const viewport: Viewport = { width: "device-width", initialScale: 1, viewportFit: "cover" };

export default async function RootLayout({ children }: { children: ReactNode }) {
  // reading the headers makes every page dynamic, so that its scripts carry the nonce of the request
  const nonce = (await headers()).get(NONCE_HEADER) ?? undefined;
  const theme = themeOf((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <html lang="en" data-theme={theme === "system" ? undefined : theme} suppressHydrationWarning>
      <head>{theme === "system" && <script nonce={nonce} dangerouslySetInnerHTML={{ __html: themeScript }} suppressHydrationWarning />}</head>
      <body>
        {nonce && <StyleNonce nonce={nonce} />}
        {children}
      </body>
    </html>
  );
}
