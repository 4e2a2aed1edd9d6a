import { queryOptions } from "@tanstack/react-query";
import { SurveysView, SurveyView } from "../../shared/contracts/holdings.ts";
import { api } from "./api.ts";

/** Everything this reader may see of the holdings. Several features start from it, so it stands here. */
export const surveysQuery = queryOptions({
  queryKey: ["surveys"],
  queryFn: ({ signal }) => api.get("/api/surveys", SurveysView, { signal }),
});

export const surveyQuery = (id: string) =>
  queryOptions({ queryKey: ["surveys", id], queryFn: ({ signal }) => api.get(`/api/surveys/${id}`, SurveyView, { signal }) });
