"use client";

import Link from "next/link";
import { usePathname } from "next/navigation";

const PLACES = [
  { href: "/scenarios", label: "Scenarios" },
  { href: "/workspace", label: "Workspace" },
] as const;

/** The places of the product; the one the page belongs to is marked. */
export function Places() {
  const path = usePathname();
  return (
    <nav aria-label="Places" className="ml-2 flex gap-[18px] max-[719px]:ml-0 max-[719px]:gap-3">
      {PLACES.map(({ href, label }) => (
        <Link
          key={href}
          href={href}
          aria-current={path.startsWith(href) ? "page" : undefined}
          className="border-b-2 border-transparent pt-[14px] pb-[12px] text-ink2 no-underline hover:text-ink aria-[current=page]:border-ink aria-[current=page]:font-semibold aria-[current=page]:text-ink"
        >
          {label}
        </Link>
      ))}
    </nav>
  );
}
