import { QueryClient } from "@tanstack/react-query";
import { ApiError } from "./request.ts";

const TRIES = 2;

/** A refusal stays a refusal; only a lost connection or a busy server is worth another try. */
const mayHelp = (error: Error) => !(error instanceof ApiError) || error.problem.status === 0 || error.problem.status === 503;

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: {
      staleTime: 15_000,
      retry: (failures, error) => failures < TRIES && mayHelp(error),
    },
  },
});
