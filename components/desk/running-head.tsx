"use client";
import Link from "next/link";
import { usePathname } from "next/navigation";
import type { ReactNode } from "react";
import { Wordmark } from "@/components/ui/marks";

export type Place = { href: string; label: string };

/** Wordmark, the places that this person may open, the demonstration note, who is signed in, sign-out. */
export function RunningHead({ places, label, demonstration, role, signOut }: { places: Place[]; label: string; demonstration: string | null; role: string; signOut: ReactNode }) {
  const path = usePathname();
  const here = places.filter(({ href }) => (href === "/desk" ? path === href : path.startsWith(href))).at(-1)?.href ?? (path.startsWith("/desk/assessments") ? "/desk/outbreaks" : undefined);
  return (
    <header className="rh">
      <div className="wrap">
        <Link className="wm" href="/desk">
          <Wordmark />
        </Link>
        <nav aria-label={label}>
          {places.map((place) => (
            <Link key={place.href} href={place.href} aria-current={place.href === here ? "page" : undefined}>
              {place.label}
            </Link>
          ))}
        </nav>
        <div className="me">
          {demonstration ? <span className="demo">{demonstration}</span> : null}
          <span>{role}</span>
          {signOut}
        </div>
      </div>
    </header>
  );
}
