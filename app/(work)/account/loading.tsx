import { LoadingBorder } from "@/components/shell/loading-border";

/** The page's own frame with empty rows. */
export default function LoadingAccount() {
  return (
    <div className="px-8 py-6 max-[719px]:px-4" aria-busy="true">
      <LoadingBorder />
      <h1>Account</h1>
      <p className="sr-only" role="status">
        Loading your account
      </p>
      <h2 className="mt-[76px]">Sessions</h2>
      <div className="mt-8 border-t-[3px] border-double border-ink">
        {Array.from({ length: 3 }, (_, n) => (
          <div key={n} className="h-[45px] border-b border-rule" />
        ))}
      </div>
    </div>
  );
}
