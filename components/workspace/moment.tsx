const words = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short", year: "numeric", hour: "2-digit", minute: "2-digit", timeZone: "UTC" });

/** A moment drawn on the server, which does not know the reader's clock: so it says whose time it is. */
export function Moment({ at }: { at: Date }) {
  return (
    <time dateTime={at.toISOString()} className="whitespace-nowrap">
      {words.format(at)} UTC
    </time>
  );
}
