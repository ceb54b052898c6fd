import Link from "next/link";

const PLACES = [
  { href: "/admin", label: "people" },
  { href: "/admin/mail", label: "mail and queues" },
  { href: "/admin/works", label: "works" },
  { href: "/admin/events", label: "events" },
] as const;

/** The parts of the administration. */
export function AdminPlaces({ here }: { here: (typeof PLACES)[number]["href"] }) {
  return (
    <nav aria-label="Administration" className="mb-8">
      <ul className="small-caps flex flex-wrap gap-x-7 text-lg">
        {PLACES.map(({ href, label }) => (
          <li key={href}>
            <Link
              href={href}
              aria-current={href === here ? "page" : undefined}
              className="inline-flex min-h-11 items-center border-b-2 border-transparent no-underline hover:text-blue aria-[current=page]:border-ink"
            >
              {label}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}
