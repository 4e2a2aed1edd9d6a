import type { Question } from "../../shared/contracts/questions.ts";
import { questionSentence } from "../../shared/wording.ts";
import type { CodebookVariable } from "../microdata/codebook.ts";
import type { Release } from "../models/Release.ts";

/** The question as the sentence that every table, export and ledger row carries. */
export function caption(question: Question, release: Release, variables: readonly CodebookVariable[], other?: Release): string {
  return questionSentence(question, {
    surveyTitle: release.survey?.title ?? "",
    wave: release.wave,
    variables,
    waves: new Map(other ? [[other.id, other.wave]] : []),
  });
}
