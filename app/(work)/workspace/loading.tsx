import { LoadingBorder } from "@/components/shell/loading-border";

const PARTS = ["Members", "What each role may do", "Audit"];

/** The page's own frame with empty rows. */
export default function LoadingWorkspace() {
  return (
    <div className="px-8 py-6 max-[719px]:px-4" aria-busy="true">
      <LoadingBorder />
      <h1>Workspace</h1>
      <p className="sr-only" role="status">
        Loading the workspace
      </p>
      {PARTS.map((part) => (
        <div key={part} className="mt-8">
          <h2 className="mb-3">{part}</h2>
          <div className="border-t-[3px] border-double border-ink">
            {Array.from({ length: 4 }, (_, n) => (
              <div key={n} className="h-[35px] border-b border-rule" />
            ))}
          </div>
        </div>
      ))}
    </div>
  );
}
