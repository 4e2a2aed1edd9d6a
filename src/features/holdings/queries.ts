import { queryOptions, useMutation } from "@tanstack/react-query";
import { z } from "zod";
import { SurveyView, type SurveyInput } from "../../../shared/contracts/holdings.ts";
import { ImportView } from "../../../shared/contracts/imports.ts";
import { api } from "../../lib/api.ts";
import { queryClient } from "../../lib/queryClient.ts";

const POLL_MS = 700;
const ImportsView = z.object({ imports: z.array(ImportView) });

export const isUnderWay = ({ status }: Pick<ImportView, "status">) => status === "queued" || status === "running";

/** A survey's imports; asked again and again while one runs, so that its progress is seen after coming back too. */
export const importsQuery = (surveyId: string) =>
  queryOptions({
    queryKey: ["surveys", surveyId, "imports"],
    queryFn: ({ signal }) => api.get(`/api/surveys/${surveyId}/imports`, ImportsView, { signal }),
    refetchInterval: ({ state }) => (state.data?.imports.some(isUnderWay) ? POLL_MS : false),
  });

const refreshSurveys = () => queryClient.invalidateQueries({ queryKey: ["surveys"] });

export const useCreateSurvey = () =>
  useMutation({ mutationFn: (input: SurveyInput) => api.post("/api/surveys", input, SurveyView), onSuccess: refreshSurveys });

export const useUpdateSurvey = (id: string) =>
  useMutation({
    mutationFn: (input: SurveyInput) => api.patch(`/api/surveys/${id}`, input, SurveyView),
    onSuccess: refreshSurveys,
  });

export const useSendRelease = (surveyId: string) =>
  useMutation({
    mutationFn: (form: FormData) => api.post(`/api/surveys/${surveyId}/releases`, form, ImportView),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: importsQuery(surveyId).queryKey }),
  });

export const useCancelImport = (surveyId: string) =>
  useMutation({
    mutationFn: (importId: string) => api.delete(`/api/imports/${importId}`, ImportView),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: importsQuery(surveyId).queryKey }),
  });
