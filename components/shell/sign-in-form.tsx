"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useState, useSyncExternalStore } from "react";
import { Button } from "@/components/ui/button";
import { Mark } from "@/components/ui/signs";
import { TextField } from "@/components/ui/text-field";
import { ROLE_WORDS, type Role } from "@/lib/access/table";
import { errorText } from "@/lib/errors";
import type { Result } from "@/lib/result";
import { ThemeSwitch } from "./theme-switch";

type DemoAccount = { email: string; role: Role; name: string };
type Props = {
  signIn: (input: { email: string; password: string; from?: string }) => Promise<Result<{ returnPath: string }>>;
  from?: string;
  demo: { password: string; accounts: DemoAccount[] } | null;
};

const never = () => () => undefined;

/** E-mail and password; a refusal says one sentence whatever the reason, and nothing typed is lost. */
export function SignInForm({ signIn, from, demo }: Props) {
  const router = useRouter();
  const [email, setEmail] = useState("");
  const [password, setPassword] = useState("");
  const [isShown, setShown] = useState(false);
  const [isBusy, setBusy] = useState(false);
  const [problems, setProblems] = useState<{ email?: string; password?: string; form?: string }>({});
  // the form works only once the page is live: until then the button says so by being off
  const isLive = useSyncExternalStore(never, () => true, () => false);

  async function submit() {
    if (!email.trim() || !password) {
      setProblems({ email: email.trim() ? undefined : "Enter your e-mail address.", password: password ? undefined : "Enter your password." });
      return;
    }
    setBusy(true);
    setProblems({});
    try {
      const result = await signIn({ email: email.trim(), password, from });
      if (result.ok) {
        router.push(result.value.returnPath);
        router.refresh();
        return;
      }
      const at = (path: string) => result.findings?.find((finding) => finding.path === path)?.text;
      setProblems({ email: at("email"), password: at("password"), form: errorText(result.code) });
    } catch {
      setProblems({ form: errorText("server.unreachable") });
    }
    setBusy(false);
  }

  return (
    <>
      <form
        className="my-auto w-full max-w-[430px] py-8"
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
      >
        <h1 className="flex items-center gap-3 text-[34px]/[40px]">
          <Mark size={40} /> Slackwater
        </h1>
        <p className="mt-3 mb-8 font-serif text-[18px]/[26px] text-ink2">Simulate and check how a bridge measures its motor current, in both directions and through the moment it turns.</p>
        <div className="grid gap-5">
          <TextField id="email" label="E-mail" type="email" autoComplete="username" value={email} onChange={(event) => setEmail(event.target.value)} problem={problems.email} />
          <div className="relative">
            <TextField id="password" label="Password" type={isShown ? "text" : "password"} autoComplete="current-password" value={password} onChange={(event) => setPassword(event.target.value)} problem={problems.password} />
            {/* inside the field, under its label */}
            <Button kind="quiet" className="absolute! top-[26px] right-[3px] text-ink2! max-[719px]:top-[25px]" onClick={() => setShown(!isShown)}>
              {isShown ? "Hide" : "Show"}
              <span className="visually-hidden"> password</span>
            </Button>
          </div>
          {problems.form && (
            <p role="alert" className="font-medium text-fault">
              {problems.form}
            </p>
          )}
          <div>
            <Button type="submit" kind="primary" size="large" disabled={isBusy || !isLive}>
              {isBusy ? "Signing in…" : "Sign in"}
            </Button>
          </div>
        </div>
      </form>
      <footer className="w-full max-w-[430px]">
        {demo && (
          <section aria-label="Demo accounts" className="mb-4 border-t-[3px] border-double border-ink pt-3">
            <p className="flex justify-between">
              <span className="caps">Demo accounts</span> <span className="text-ink3">this machine only</span>
            </p>
            <div className="mt-3 grid grid-cols-3 gap-[6px] max-[359px]:grid-cols-2">
              {demo.accounts.map((account) => (
                <Button
                  key={account.email}
                  className="justify-center"
                  title={account.name}
                  onClick={() => {
                    setEmail(account.email);
                    setPassword(demo.password);
                    setProblems({});
                  }}
                >
                  {account.email.startsWith("second-") ? "Designer 2" : ROLE_WORDS[account.role].name}
                </Button>
              ))}
            </div>
            <p className="mt-2 text-ink3">Choose one to fill in the form.</p>
          </section>
        )}
        <p className="flex items-center justify-between">
          <Link href="/">What Slackwater does</Link>
          <ThemeSwitch />
        </p>
      </footer>
    </>
  );
}
