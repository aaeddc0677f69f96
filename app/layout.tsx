import type { ReactNode } from "react";

/** The layouts below own <html>: each knows its own language and direction. */
export default function RootLayout({ children }: { children: ReactNode }) {
  return children;
}
