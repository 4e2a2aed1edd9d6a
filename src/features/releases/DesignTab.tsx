import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { CodebookView } from "../../../shared/contracts/codebook.ts";
import type { DesignView } from "../../../shared/contracts/design.ts";
import { Button } from "../../components/Button.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Notice } from "../../components/Notice.tsx";
import { Section } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import { messageOf } from "../../lib/form.ts";
import { ApiError } from "../../lib/request.ts";
import { designOf, draftOf, type DesignDraft, type FieldErrors } from "./designDraft.ts";
import { DesignFacts } from "./DesignFacts.tsx";
import { MinimumFields } from "./MinimumFields.tsx";
import { codebookQuery, designQuery, useDeclareDesign } from "./queries.ts";
import { useRelease } from "./ReleaseLayout.tsx";
import { ReplicateFields } from "./ReplicateFields.tsx";
import { SampleFields } from "./SampleFields.tsx";
import { VariableField } from "./VariableField.tsx";

/** Changes some fields of the form. */
export type ChangeDraft = (part: Partial<DesignDraft>) => void;

/** How the sample was drawn, for the errors of every figure, and what may not be shown. */
export function DesignTab() {
  const { id } = useRelease();
  const design = useQuery(designQuery(id));
  const codebook = useQuery(codebookQuery(id));
  if (design.isPending || codebook.isPending) return <PageLoading what="the design" />;
  if (design.isError) return <PageError error={design.error} onRetry={design.refetch} />;
  if (codebook.isError) return <PageError error={codebook.error} onRetry={codebook.refetch} />;
  if (!design.data.can.update) return <DesignFacts design={design.data.design} />;
  return <DesignForm view={design.data} codebook={codebook.data} />;
}

function DesignForm({ view, codebook }: { view: DesignView; codebook: CodebookView }) {
  const declare = useDeclareDesign(view.releaseId);
  const [draft, setDraft] = useState(() => draftOf(view.design));
  const [errors, setErrors] = useState<FieldErrors>({});
  const [isSaved, setIsSaved] = useState(false);
  const change: ChangeDraft = (part) => {
    setDraft({ ...draft, ...part });
    setIsSaved(false);
  };
  const submit = () => {
    const read = designOf(draft);
    if ("errors" in read) {
      setErrors(read.errors);
      return;
    }
    setErrors({});
    declare.mutate(read.design, {
      onSuccess: () => setIsSaved(true),
      onError: (error) => setErrors(error instanceof ApiError ? (error.problem.fields ?? {}) : {}),
    });
  };
  const hasErrors = Object.keys(errors).length > 0;
  return (
    <form
      noValidate
      className="measure"
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
    >
      <Section title="Weight">
        <VariableField
          label="Weight"
          variables={codebook.variables.filter(({ kind }) => kind !== "text")}
          value={draft.weight}
          onChange={(weight) => change({ weight })}
          error={errors.weight}
          description="How many people each respondent stands for. Leave it empty only if everyone counts the same."
        />
      </Section>
      <Section
        title="How sure a figure is"
        lead="Errors follow from how the sample was drawn, or from replicate weights that came with the data."
      >
        <div className="space-y-6">
          <RadioChoices
            label="Variances from"
            choices={[
              { value: "strata", label: "Strata and PSUs", detail: "The usual way, when the file names them." },
              {
                value: "replicates",
                label: "Replicate weights",
                detail: "When the file holds columns such as repwt1 to repwt80 instead.",
              },
            ]}
            value={draft.variance}
            onChange={(variance) => change({ variance })}
          />
          {draft.variance === "strata" ? (
            <SampleFields draft={draft} change={change} errors={errors} variables={codebook.variables} />
          ) : (
            <ReplicateFields draft={draft} change={change} errors={errors} />
          )}
        </div>
      </Section>
      <Section
        title="What isn't shown"
        lead={`A cell below any of these is withheld, with whatever else would give it away. This installation allows no less than ${view.floor.respondents} respondents.`}
      >
        <MinimumFields draft={draft} change={change} errors={errors} />
      </Section>
      <div className="mt-10 space-y-4">
        {declare.isError && !hasErrors && <Notice kind="wrong">{messageOf(declare.error)}</Notice>}
        {hasErrors && <Notice kind="wrong">Some fields need a look; they say what is wrong. The design wasn't changed.</Notice>}
        {isSaved && (
          <Notice kind="done" title="The design is declared">
            <p>Every check was done anew.</p>
            <p className="pt-2">
              <LinkButton to={`/releases/${view.releaseId}/readiness`}>Look at the readiness</LinkButton>
            </p>
          </Notice>
        )}
        <Button type="submit" kind="primary" isPending={declare.isPending}>
          Declare the design
        </Button>
      </div>
    </form>
  );
}
