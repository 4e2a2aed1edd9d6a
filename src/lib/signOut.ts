import { useMutation } from "@tanstack/react-query";
import { z } from "zod";
import { api } from "./api.ts";
import { queryClient } from "./queryClient.ts";

/** Ends the session on the server, then forgets everything it could see. */
export function useSignOut() {
  return useMutation({
    mutationFn: () => api.delete("/api/session", z.unknown()),
    onSuccess: async () => {
      await queryClient.cancelQueries();
      // A whole new page: nothing of the last person stays in memory.
      window.location.assign("/sign-in");
    },
  });
}
