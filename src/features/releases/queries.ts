import { queryOptions, useMutation } from "@tanstack/react-query";
import { CodebookView, VariableView, type VariableChange } from "../../../shared/contracts/codebook.ts";
import { DesignView, type Design } from "../../../shared/contracts/design.ts";
import { ReleaseView } from "../../../shared/contracts/holdings.ts";
import { ReadinessView } from "../../../shared/contracts/readiness.ts";
import { api, Nothing } from "../../lib/api.ts";
import { queryClient } from "../../lib/queryClient.ts";

export const releaseQuery = (id: string) =>
  queryOptions({ queryKey: ["releases", id], queryFn: ({ signal }) => api.get(`/api/releases/${id}`, ReleaseView, { signal }) });

export const codebookQuery = (id: string) =>
  queryOptions({
    queryKey: ["releases", id, "codebook"],
    queryFn: ({ signal }) => api.get(`/api/releases/${id}/codebook`, CodebookView, { signal }),
  });

export const designQuery = (id: string) =>
  queryOptions({
    queryKey: ["releases", id, "design"],
    queryFn: ({ signal }) => api.get(`/api/releases/${id}/design`, DesignView, { signal }),
  });

export const readinessQuery = (id: string) =>
  queryOptions({
    queryKey: ["releases", id, "readiness"],
    queryFn: ({ signal }) => api.get(`/api/releases/${id}/readiness`, ReadinessView, { signal }),
    staleTime: 0,
  });

/** Everything of a release may follow from a change to any of it. */
async function refresh(id: string): Promise<void> {
  await queryClient.invalidateQueries({ queryKey: ["releases", id] });
  await queryClient.invalidateQueries({ queryKey: ["surveys"] });
}

export const useChangeVariable = (releaseId: string) =>
  useMutation({
    mutationFn: ({ id, change }: { id: string; change: VariableChange }) =>
      api.patch(`/api/releases/${releaseId}/codebook/${id}`, change, VariableView),
    onSuccess: () => refresh(releaseId),
  });

export const useDeclareDesign = (releaseId: string) =>
  useMutation({
    mutationFn: (design: Design) => api.put(`/api/releases/${releaseId}/design`, design, DesignView),
    onSuccess: () => refresh(releaseId),
  });

export const usePublish = (releaseId: string) =>
  useMutation({
    mutationFn: () => api.post(`/api/releases/${releaseId}/publication`, undefined, ReleaseView),
    onSuccess: () => refresh(releaseId),
  });

export const useRemoveRelease = (releaseId: string) =>
  useMutation({
    mutationFn: () => api.delete(`/api/releases/${releaseId}`, Nothing),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ["surveys"] }),
  });
