import type { Metadata, Viewport } from "next";
import Link from "next/link";
import { connection } from "next/server";
import type { ReactNode } from "react";
// First, so that every style of ours comes after it, in whatever order the charts are loaded.
import "leaflet/dist/leaflet.css";
import "./tokens.css";
import styles from "./layout.module.css";

export const metadata: Metadata = {
  title: { default: "Offing", template: "%s · Offing" },
  description: "Finds the storm behind the swell.",
};

export const viewport: Viewport = {
  width: "device-width",
  initialScale: 1,
  themeColor: [
    { media: "(prefers-color-scheme: light)", color: "#f7f5ef" },
    { media: "(prefers-color-scheme: dark)", color: "#10181e" },
  ],
};

export default async function RootLayout({ children }: { children: ReactNode }) {
  // A page that only reads the database would otherwise be made once, at build, and never again.
  await connection();
  return (
    <html lang="en">
      <body>
        <a className={styles.skip} href="#main">
          Skip to the main part
        </a>
        <header className={styles.header}>
          <Link className={styles.name} href="/">
            Offing
          </Link>
          <nav aria-label="Screens">
            <Link className={styles.screen} href="/">
              Events
            </Link>
            <Link className={styles.screen} href="/readings">Hand readings</Link>
            <Link className={styles.screen} href="/stations">
              Stations
            </Link>
          </nav>
        </header>
        <main id="main" tabIndex={-1} className={styles.main}>
          {children}
        </main>
      </body>
    </html>
  );
}
