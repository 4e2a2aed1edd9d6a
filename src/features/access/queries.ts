import { queryOptions, useMutation } from "@tanstack/react-query";
import { z } from "zod";
import { GrantsView, GrantView, type GrantInput } from "../../../shared/contracts/access.ts";
import { CandidatesView } from "../../../shared/contracts/people.ts";
import { api } from "../../lib/api.ts";
import { queryClient } from "../../lib/queryClient.ts";

export const grantsQuery = (surveyId: string) =>
  queryOptions({
    queryKey: ["surveys", surveyId, "grants"],
    queryFn: ({ signal }) => api.get(`/api/surveys/${surveyId}/grants`, GrantsView, { signal }),
  });

export const candidatesQuery = (surveyId: string) =>
  queryOptions({
    queryKey: ["surveys", surveyId, "candidates"],
    queryFn: ({ signal }) => api.get(`/api/surveys/${surveyId}/candidates`, CandidatesView, { signal }),
  });

const refresh = (surveyId: string) => queryClient.invalidateQueries({ queryKey: ["surveys", surveyId] });

export const useGiveGrant = (surveyId: string) =>
  useMutation({
    mutationFn: (input: GrantInput) => api.post(`/api/surveys/${surveyId}/grants`, input, GrantView),
    onSuccess: () => refresh(surveyId),
  });

export const useRevokeGrant = (surveyId: string) =>
  useMutation({
    mutationFn: (grantId: string) => api.delete(`/api/grants/${grantId}`, GrantView),
    onSuccess: () => refresh(surveyId),
  });

export const useSetStewards = (surveyId: string) =>
  useMutation({
    mutationFn: (personIds: string[]) => api.put(`/api/surveys/${surveyId}/stewards`, { personIds }, z.unknown()),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ["surveys"] }),
  });
