const DAY = new Intl.DateTimeFormat("en-GB", {
  day: "numeric",
  month: "long",
  year: "numeric",
  timeZone: "UTC",
});
const CLOCK = new Intl.DateTimeFormat("en-GB", { hour: "2-digit", minute: "2-digit", timeZone: "UTC" });

/** A moment: "1 December 2026" (`withClock` adds the time, in UTC), with the full UTC time as its title. */
export function Time({ at, withClock = false }: { at: Date | string; withClock?: boolean }) {
  const moment = typeof at === "string" ? new Date(at) : at;
  const iso = moment.toISOString();
  return (
    <time
      dateTime={iso}
      title={`${iso.slice(0, 10)} ${iso.slice(11, 19)} UTC`}
      className="old-style whitespace-nowrap"
    >
      {DAY.format(moment)}
      {withClock ? `, ${CLOCK.format(moment)} UTC` : ""}
    </time>
  );
}
