import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { ReversalChart } from "@/components/shell/reversal-chart";
import { SignInForm } from "@/components/shell/sign-in-form";
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { safeReturnPath } from "@/lib/access/return-path";
import { reversalChart } from "@/lib/explain/reversal-chart";
import { getPerson } from "@/lib/server/actor";
import { signIn } from "./actions";

export const metadata: Metadata = { title: "Sign in" };

type Props = { searchParams: Promise<{ from?: string }> };

export default async function SignInPage({ searchParams }: Props) {
  const { from } = await searchParams;
  const returnPath = safeReturnPath(from);
  if (await getPerson()) redirect(returnPath);
  const demo =
    process.env.SLACKWATER_DEMO === "1"
      ? { password: DEMO_PASSWORD, accounts: DEMO_ACCOUNTS.filter((one) => one.workspace === "home").map(({ email, role, name }) => ({ email, role, name })) }
      : null;
  return (
    <div className="grid min-h-dvh grid-cols-[1fr_470px] max-[1099px]:grid-cols-1">
      <div className="border-r border-ink max-[1099px]:hidden">
        <ReversalChart chart={reversalChart()} />
      </div>
      <main id="main" className="flex flex-col bg-sheet px-16 py-10 max-[1099px]:px-6">
        <SignInForm signIn={signIn} from={from} demo={demo} />
      </main>
    </div>
  );
}
