import { queryOptions, useMutation } from "@tanstack/react-query";
import { NewSignInLink, PeopleView, PersonView, type PersonChange, type PersonInput } from "../../../shared/contracts/people.ts";
import { api } from "../../lib/api.ts";
import { queryClient } from "../../lib/queryClient.ts";

export const peopleQuery = queryOptions({
  queryKey: ["people"],
  queryFn: ({ signal }) => api.get("/api/people", PeopleView, { signal }),
});

const refresh = () => queryClient.invalidateQueries({ queryKey: peopleQuery.queryKey });

export const useAddPerson = () =>
  useMutation({ mutationFn: (input: PersonInput) => api.post("/api/people", input, NewSignInLink), onSuccess: refresh });

export const useChangePerson = (id: string) =>
  useMutation({ mutationFn: (change: PersonChange) => api.patch(`/api/people/${id}`, change, PersonView), onSuccess: refresh });

export const useNewLink = (id: string) =>
  useMutation({ mutationFn: () => api.post(`/api/people/${id}/sign-in-link`, undefined, NewSignInLink), onSuccess: refresh });
