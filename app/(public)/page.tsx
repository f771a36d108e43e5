import Link from "next/link";
import { redirect } from "next/navigation";
import { LiveExample } from "@/components/scenario/live-example";
import { PublicHead } from "@/components/shell/public-head";
import { templateById } from "@/lib/scenario/templates";
import { getPerson } from "@/lib/server/actor";

const POINTS = [
  ["It knows what each shunt carries", "In every conduction state: drive, recirculation, return to the supply, dead time, coasting. Beside it stands the true motor current, and what a reader of the output would believe."],
  ["Drag a value, see the answer", "Bridge, motor, sensing chain and converter are computed in the page, exactly between switching instants. A second of drive takes milliseconds."],
  ["Every figure says why", "Formula, the numbers put in, and the source. The energy balance of the run is shown with it."],
  ["A link opens without an account", "Save a revision, send a link. Whoever opens it plays with the values; nothing they change is kept."],
] as const;

export default async function FrontPage() {
  if (await getPerson()) redirect("/scenarios");
  return (
    <div className="min-h-dvh">
      <PublicHead>
        <Link className="button" data-kind="primary" href="/sign-in">
          Sign in
        </Link>
      </PublicHead>
      <main id="main" className="mx-auto max-w-[1180px] px-6 pt-10 pb-16">
        <h1 className="max-w-[26ch] text-[40px]/[46px] max-[719px]:text-[30px]/[36px]">Measure a motor’s current rightly on both sides of zero</h1>
        <p className="mt-4 max-w-[66ch] font-serif text-[18px]/[27px] text-ink2">
          Slackwater simulates a PWM H-bridge, its motor and its current sensing, and shows what every shunt and every output reads beside the current that really flows: through a direction reversal, while energy returns to the supply, at stall.
        </p>
        <div className="mt-8">
          <LiveExample document={templateById("reversal")!.document} />
        </div>
        <dl className="mt-12 grid grid-cols-2 gap-x-10 gap-y-7 border-t-[3px] border-double border-ink pt-6 max-[719px]:grid-cols-1">
          {POINTS.map(([term, text]) => (
            <div key={term}>
              <dt className="font-serif text-[18px]/[24px] font-medium">{term}</dt>
              <dd className="mt-1 max-w-[60ch] text-ink2">{text}</dd>
            </div>
          ))}
        </dl>
        <p className="mt-10 max-w-[80ch] border-t border-rule pt-4 text-ink3">
          Bridges, motors and their supplies hold energy: capacitors stay charged, shafts start without warning, stalled motors heat within seconds. The simulation does not replace protection, licensed practice or your local electrical code.
        </p>
      </main>
    </div>
  );
}
