import { useMutation } from "@tanstack/react-query";
import type { ChangePasswordInput } from "../../../shared/contracts/session.ts";
import { api, Nothing } from "../../lib/api.ts";

export const useChangePassword = () =>
  useMutation({ mutationFn: (input: ChangePasswordInput) => api.put("/api/account/password", input, Nothing) });
