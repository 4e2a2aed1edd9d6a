import { useQuery, useSuspenseQuery } from "@tanstack/react-query";
import type { ReactNode } from "react";
import { Navigate, useLocation } from "react-router-dom";
import type { SessionView } from "../../shared/contracts/session.ts";
import { PageError } from "../components/PageError.tsx";
import { PageLoading } from "../components/PageLoading.tsx";
import { sessionQuery } from "./sessionQuery.ts";

export type SignedIn = SessionView & { person: NonNullable<SessionView["person"]> };

/** The address to come back to after signing in, as a search string for the sign-in page. */
export const returnSearch = (address: string) => (address === "/" ? "" : `?to=${encodeURIComponent(address)}`);

/** Where to go after signing in: only an address of this site, never one that another site put there. */
export function returnAddress(search: URLSearchParams): string {
  const to = search.get("to");
  if (to === null || !to.startsWith("/")) return "/";
  const address = new URL(to, window.location.origin);
  return address.origin === window.location.origin ? `${address.pathname}${address.search}${address.hash}` : "/";
}

/** Shows its children to a signed-in person; anyone else goes to sign in and comes back to this address. */
export function RequireSession({ children }: { children: ReactNode }) {
  const session = useQuery(sessionQuery);
  const { pathname, search, hash } = useLocation();
  if (session.isPending) return <PageLoading what="your session" />;
  if (session.isError) return <PageError error={session.error} onRetry={session.refetch} />;
  if (session.data.person === null) return <Navigate to={`/sign-in${returnSearch(pathname + search + hash)}`} replace />;
  return children;
}

/** The signed-in person's session; for use under `RequireSession` only. */
export function useSession(): SignedIn {
  const { data } = useSuspenseQuery(sessionQuery);
  // Under RequireSession a person is there but for the moment between losing it and leaving the page.
  const person = data.person ?? { id: "", name: "", email: "", roles: [] };
  return { ...data, person };
}
