import { NavLink } from "react-router-dom";

/** Pages that belong together, each with its own address. */
export function PageTabs({ label, tabs }: { label: string; tabs: readonly { to: string; label: string; isIndex?: boolean }[] }) {
  return (
    <nav aria-label={label} className="mb-8 -mt-2 flex gap-6 overflow-x-auto border-b border-line no-print">
      {tabs.map((tab) => (
        <NavLink
          key={tab.to}
          to={tab.to}
          end={tab.isIndex ?? false}
          className="-mb-px inline-flex min-h-10 items-center border-b-2 border-transparent whitespace-nowrap text-muted hover:text-action aria-[current=page]:border-action aria-[current=page]:font-semibold aria-[current=page]:text-action"
        >
          {tab.label}
        </NavLink>
      ))}
    </nav>
  );
}
