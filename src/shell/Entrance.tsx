import type { ReactNode } from "react";
import { Mark } from "./Mark.tsx";

/** Around the pages of someone who isn't signed in yet. */
export function Entrance({ title, lead, children }: { title: string; lead?: ReactNode; children: ReactNode }) {
  return (
    <main className="mx-auto flex min-h-dvh w-full max-w-md flex-col px-4 pt-12 pb-16 sm:pt-[14vh]">
      <title>{`${title} · Perhundred`}</title>
      <p className="flex items-center gap-3 font-semibold">
        <Mark className="size-9" />
        Perhundred
      </p>
      <h1 className="mt-8 text-[1.75rem] leading-tight font-light">{title}</h1>
      {lead !== undefined && <div className="mt-2 text-muted">{lead}</div>}
      <div className="mt-8">{children}</div>
    </main>
  );
}
