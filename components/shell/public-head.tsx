import Link from "next/link";
import type { ReactNode } from "react";
import { Mark } from "@/components/ui/signs";
import { ThemeSwitch } from "./theme-switch";

/** Head of the pages that need no account. */
export function PublicHead({ children }: { children?: ReactNode }) {
  return (
    <>
      <a href="#main" className="skip-link button">
        Skip to the page
      </a>
      <header className="flex h-head items-center gap-4 px-5 max-[719px]:px-3">
        <Link href="/" className="flex items-center gap-2 font-serif text-[19px]/[24px] font-medium no-underline">
          <Mark /> Slackwater
        </Link>
        <span className="grow" />
        <ThemeSwitch />
        {children}
      </header>
      <div className="graduated" aria-hidden />
    </>
  );
}
