import { WorkbenchFrame } from "@/components/scenario/workbench-frame";

/** The page's own rules and labels at once, empty; no grey blocks. */
export default function Loading() {
  return <WorkbenchFrame />;
}
