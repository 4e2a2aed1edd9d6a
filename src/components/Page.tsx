import { ChevronLeft } from "lucide-react";
import type { ReactNode } from "react";
import { Link } from "react-router-dom";

export interface PageProps {
  /** Also the window's title, unless `windowTitle` says otherwise. */
  title: ReactNode;
  windowTitle?: string;
  /** One or two sentences under the title. */
  lead?: ReactNode;
  /** Buttons and links for the whole page. */
  actions?: ReactNode;
  /** Where this page hangs. */
  parent?: { to: string; label: string } | undefined;
  /** Panel beside the content, under it on a narrow screen. */
  aside?: ReactNode;
  children?: ReactNode;
}

/** The frame of every page: where it hangs, what it is, what can be done, and its content. */
export function Page({ title, windowTitle, lead, actions, parent, aside, children }: PageProps) {
  const name = windowTitle ?? (typeof title === "string" ? title : "");
  const content = (
    <div className="min-w-0 flex-1 px-4 pt-6 pb-16 sm:px-8 sm:pt-8">
      <title>{name ? `${name} · Perhundred` : "Perhundred"}</title>
      {parent && (
        <Link
          to={parent.to}
          className="mb-2 -ml-1 inline-flex min-h-6 items-center gap-1 text-sm text-muted hover:text-action no-print"
        >
          <ChevronLeft aria-hidden="true" className="size-4" />
          {parent.label}
        </Link>
      )}
      <div className="flex flex-wrap items-end justify-between gap-x-8 gap-y-4">
        <div className="min-w-0">
          <h1 className="text-[1.7rem] leading-tight font-light tracking-[-0.01em] break-words sm:text-[2rem]">{title}</h1>
          {lead !== undefined && <div className="measure mt-2 text-muted">{lead}</div>}
        </div>
        {actions !== undefined && <div className="flex flex-wrap items-center gap-3 no-print">{actions}</div>}
      </div>
      <div className="mt-8">{children}</div>
    </div>
  );
  if (aside === undefined) return <div className="max-w-[76rem]">{content}</div>;
  return (
    <div className="flex flex-1 flex-col lg:flex-row">
      {content}
      <aside className="border-line bg-raised max-lg:border-t lg:w-80 lg:shrink-0 lg:border-l">
        <div className="px-4 py-7 sm:px-8 lg:px-6">{aside}</div>
      </aside>
    </div>
  );
}

/** A part of a page under its own heading. */
export function Section({
  title,
  lead,
  actions,
  children,
}: {
  title: string;
  lead?: ReactNode;
  actions?: ReactNode;
  children: ReactNode;
}) {
  return (
    <section className="mt-12 first:mt-0">
      <div className="mb-4 flex flex-wrap items-baseline justify-between gap-x-6 gap-y-2">
        <div>
          <h2 className="text-lg font-medium">{title}</h2>
          {lead !== undefined && <div className="measure mt-1 text-sm text-muted">{lead}</div>}
        </div>
        {actions}
      </div>
      {children}
    </section>
  );
}
