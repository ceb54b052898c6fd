import type { Metadata, Viewport } from "next";
import { cookies, headers } from "next/headers";
import type { ReactNode } from "react";

import "@fontsource/stix-two-text/400.css";
import "@fontsource-variable/atkinson-hyperlegible-next";
import "katex/dist/katex.min.css";
import "./globals.css";

import { uiFace, workFace } from "@/components/fonts";
import { readTheme, THEME_COOKIE } from "@/components/theme";
import { ToastProvider } from "@/components/ui/toast";

export const metadata: Metadata = {
  title: { default: "Surdmark", template: "%s · Surdmark" },
  description:
    "Recomputes the angular-momentum coupling coefficients of an answer key exactly, says how a wrong one came to be wrong, and freezes a verified key for print.",
  icons: { icon: { url: "/icon.svg", type: "image/svg+xml" } },
  robots: { index: false, follow: false },
};

export const viewport: Viewport = {
  themeColor: [
    { media: "(prefers-color-scheme: light)", color: "#f1eadc" },
    { media: "(prefers-color-scheme: dark)", color: "#15120d" },
  ],
};

/** The shell of every page. Reading the request's headers keeps each page dynamic, so its scripts carry the nonce. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  await headers();
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <html
      lang="en-GB"
      className={`${workFace.variable} ${uiFace.variable}`}
      data-theme={theme === "system" ? undefined : theme}
      suppressHydrationWarning
    >
      <body>
        <ToastProvider>{children}</ToastProvider>
      </body>
    </html>
  );
}
