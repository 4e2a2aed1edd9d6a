import { queryOptions, useMutation } from "@tanstack/react-query";
import { SessionView, SignInLinkView, type AcceptLinkInput, type SignInInput } from "../../../shared/contracts/session.ts";
import { api } from "../../lib/api.ts";
import { takeSession } from "../../lib/sessionQuery.ts";

const linkPath = (token: string) => `/api/sign-in-links/${encodeURIComponent(token)}`;

export const signInLinkQuery = (token: string) =>
  queryOptions({
    queryKey: ["signInLinks", token],
    queryFn: ({ signal }) => api.get(linkPath(token), SignInLinkView, { signal }),
    staleTime: Infinity,
  });

export const useSignIn = () =>
  useMutation({ mutationFn: (input: SignInInput) => api.post("/api/session", input, SessionView), onSuccess: takeSession });

export const useAcceptLink = (token: string) =>
  useMutation({ mutationFn: (input: AcceptLinkInput) => api.post(linkPath(token), input, SessionView), onSuccess: takeSession });
