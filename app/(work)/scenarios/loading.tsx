import { LoadingBorder } from "@/components/shell/loading-border";

/** The list's own frame with empty rows: the rules and labels stand at once. */
export default function LoadingScenarios() {
  return (
    <div className="px-8 py-6 max-[719px]:px-4" aria-busy="true">
      <LoadingBorder />
      <h1>Scenarios</h1>
      <p className="sr-only" role="status">
        Loading the scenarios
      </p>
      <div className="mt-16 border-t-[3px] border-double border-ink">
        {Array.from({ length: 8 }, (_, n) => (
          <div key={n} className="h-[55px] border-b border-rule" />
        ))}
      </div>
    </div>
  );
}
