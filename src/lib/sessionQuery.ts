import { queryOptions } from "@tanstack/react-query";
import { SessionView } from "../../shared/contracts/session.ts";
import { queryClient } from "./queryClient.ts";
import { request } from "./request.ts";

/** Who is signed in, what they may do, and the token that every change carries. */
export const sessionQuery = queryOptions({
  queryKey: ["session"],
  queryFn: ({ signal }) => request("GET", "/api/session", SessionView, { signal }),
  staleTime: 5 * 60_000,
});

/** Takes over a session that the server has just begun or ended: what the one before could see is forgotten. */
export function takeSession(session: SessionView): void {
  queryClient.removeQueries({ predicate: (query) => query.queryKey[0] !== sessionQuery.queryKey[0] });
  queryClient.setQueryData(sessionQuery.queryKey, session);
}

/** The server no longer knows this person. Pages that need one send them to sign in; the token is fetched anew there. */
export function forgetPerson(): void {
  queryClient.setQueryData(sessionQuery.queryKey, (session) => session && { ...session, person: null });
  void queryClient.invalidateQueries({ queryKey: sessionQuery.queryKey });
}
