import type { z } from "zod";
import { GrantInput, GrantView, GrantsView, StewardsInput } from "../../shared/contracts/access.ts";
import { CodebookView, VariableChange, VariableView } from "../../shared/contracts/codebook.ts";
import { DesignInput, DesignView } from "../../shared/contracts/design.ts";
import { ReleaseView, SurveyInput, SurveyView, SurveysView } from "../../shared/contracts/holdings.ts";
import { ImportView } from "../../shared/contracts/imports.ts";
import { LedgerView } from "../../shared/contracts/ledger.ts";
import {
  CandidatesView,
  NewSignInLink,
  PeopleView,
  PersonChange,
  PersonInput,
  PersonView,
} from "../../shared/contracts/people.ts";
import { Question } from "../../shared/contracts/questions.ts";
import { ReadinessView } from "../../shared/contracts/readiness.ts";
import {
  AcceptLinkInput,
  ChangePasswordInput,
  SessionView,
  SignInInput,
  SignInLinkView,
} from "../../shared/contracts/session.ts";
import { ScriptView, Table } from "../../shared/contracts/tables.ts";

/** One call of the API. `answer` null: 204 or a file; the summary says which. */
export interface Operation {
  method: "get" | "post" | "put" | "patch" | "delete";
  /** As Express spells it, under /api. */
  path: string;
  summary: string;
  body?: z.ZodType;
  answer: z.ZodType | null;
  status?: number;
}

/** Every call of the API with its contracts; a test holds it against the registered routes. */
export const OPERATIONS: readonly Operation[] = [
  { method: "get", path: "/health", summary: "200 once questions can be asked, 503 before.", answer: null },
  { method: "get", path: "/openapi.json", summary: "This description.", answer: null },
  {
    method: "get",
    path: "/session",
    summary: "Who is signed in, what they may do, and the CSRF token for changes.",
    answer: SessionView,
  },
  { method: "post", path: "/session", summary: "Signs in.", body: SignInInput, answer: SessionView },
  { method: "delete", path: "/session", summary: "Signs out.", answer: null, status: 204 },
  { method: "get", path: "/sign-in-links/:token", summary: "Whom a one-time link is for.", answer: SignInLinkView },
  {
    method: "post",
    path: "/sign-in-links/:token",
    summary: "Chooses a password through a one-time link and signs in.",
    body: AcceptLinkInput,
    answer: SessionView,
  },
  {
    method: "put",
    path: "/account/password",
    summary: "Changes one's own password; other sessions end.",
    body: ChangePasswordInput,
    answer: null,
    status: 204,
  },
  { method: "get", path: "/people", summary: "All people; administrators.", answer: PeopleView },
  {
    method: "post",
    path: "/people",
    summary: "Adds a person; the answer holds their one-time link, this once.",
    body: PersonInput,
    answer: NewSignInLink,
    status: 201,
  },
  {
    method: "patch",
    path: "/people/:id",
    summary: "Changes name or roles, deactivates or reactivates.",
    body: PersonChange,
    answer: PersonView,
  },
  {
    method: "post",
    path: "/people/:id/sign-in-link",
    summary: "Makes a new one-time link; the person's sessions end.",
    answer: NewSignInLink,
    status: 201,
  },
  { method: "get", path: "/surveys", summary: "The surveys one may see, with their releases.", answer: SurveysView },
  {
    method: "post",
    path: "/surveys",
    summary: "Creates a survey; one becomes its steward.",
    body: SurveyInput,
    answer: SurveyView,
    status: 201,
  },
  { method: "get", path: "/surveys/:id", summary: "One survey.", answer: SurveyView },
  { method: "patch", path: "/surveys/:id", summary: "Changes title or description.", body: SurveyInput, answer: SurveyView },
  {
    method: "put",
    path: "/surveys/:id/stewards",
    summary: "Sets the survey's stewards.",
    body: StewardsInput,
    answer: SurveyView,
  },
  {
    method: "get",
    path: "/surveys/:id/candidates",
    summary: "People who may be given a grant or made a steward.",
    answer: CandidatesView,
  },
  { method: "get", path: "/surveys/:id/grants", summary: "All grants of a survey.", answer: GrantsView },
  { method: "post", path: "/surveys/:id/grants", summary: "Gives a grant.", body: GrantInput, answer: GrantView, status: 201 },
  { method: "delete", path: "/grants/:id", summary: "Takes a grant back from the very next request on.", answer: GrantView },
  {
    method: "post",
    path: "/surveys/:id/releases",
    summary:
      "Multipart: field `wave`, file `microdata` (CSV), optional file `codebook` (CSV), in this order. Answers with the import to follow.",
    answer: ImportView,
    status: 202,
  },
  { method: "get", path: "/surveys/:id/imports", summary: "A survey's imports, newest first.", answer: null },
  { method: "get", path: "/imports/:id", summary: "An import's progress and problems.", answer: ImportView },
  { method: "delete", path: "/imports/:id", summary: "Cancels an import; nothing of it stays.", answer: ImportView },
  { method: "get", path: "/codebook-template.csv", summary: "An example codebook (CSV).", answer: null },
  { method: "get", path: "/releases/:id", summary: "One release.", answer: ReleaseView },
  { method: "delete", path: "/releases/:id", summary: "Removes a draft.", answer: null, status: 204 },
  { method: "get", path: "/releases/:id/codebook", summary: "A release's variables.", answer: CodebookView },
  { method: "get", path: "/releases/:id/codebook.csv", summary: "The codebook as CSV.", answer: null },
  {
    method: "patch",
    path: "/releases/:id/codebook/:variableId",
    summary: "Changes a draft's variable.",
    body: VariableChange,
    answer: VariableView,
  },
  { method: "get", path: "/releases/:id/design", summary: "The declared design.", answer: DesignView },
  { method: "put", path: "/releases/:id/design", summary: "Declares the whole design.", body: DesignInput, answer: DesignView },
  { method: "get", path: "/releases/:id/readiness", summary: "A release's checks.", answer: ReadinessView },
  { method: "post", path: "/releases/:id/publication", summary: "Publishes a draft without faults.", answer: ReleaseView },
  { method: "post", path: "/tables", summary: "Puts a question; answers a table.", body: Question, answer: Table },
  {
    method: "post",
    path: "/tables/downloads",
    summary: "Records that a table's figures leave the page: `{question, format}`.",
    answer: null,
    status: 204,
  },
  {
    method: "post",
    path: "/tables/script",
    summary: "A script in R that works a question's table out again from the release's CSV: `{question}`.",
    answer: ScriptView,
  },
  {
    method: "get",
    path: "/ledger",
    summary: "What was done; `survey`, `action`, `text`, `before` narrow it.",
    answer: LedgerView,
  },
  { method: "get", path: "/ledger.csv", summary: "The same as CSV.", answer: null },
];
