import { Button } from "../../components/Button.tsx";
import { EmptyState } from "../../components/EmptyState.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Draft } from "./draft.ts";
import { exampleQuestions } from "./examples.ts";

/** Stands where the answer will be until an outcome is chosen. */
export function AskStart({
  variables,
  onChange,
}: {
  variables: readonly VariableView[];
  onChange: (changes: Partial<Draft>) => void;
}) {
  const examples = exampleQuestions(variables);
  return (
    <EmptyState title="Choose an outcome to begin.">
      <p>
        Each underlined part of the sentence can be changed. The answer appears as soon as the sentence can be read to its end.
      </p>
      {examples.length > 0 && (
        <>
          <p>Or try one of these:</p>
          <ul className="space-y-1">
            {examples.map(({ words, changes }) => (
              <li key={words}>
                <Button kind="plain" className="!justify-start !text-left !whitespace-normal" onPress={() => onChange(changes)}>
                  {words}
                </Button>
              </li>
            ))}
          </ul>
        </>
      )}
    </EmptyState>
  );
}

/** Nothing can be asked yet, and why. */
export function NothingToAsk({ hasSurveys }: { hasSurveys: boolean }) {
  return hasSurveys ? (
    <EmptyState title="No release is published yet." actions={<LinkButton to="/holdings">Go to the holdings</LinkButton>}>
      <p>
        Questions are put to published releases. A survey's steward publishes a release once its design is declared and its checks
        pass.
      </p>
    </EmptyState>
  ) : (
    <EmptyState title="No survey is open to you yet." actions={<LinkButton to="/holdings">Go to the holdings</LinkButton>}>
      <p>
        A data steward decides who may use a survey, for what and until when. Ask the steward of the survey you need for access;
        it appears here as soon as it is given.
      </p>
    </EmptyState>
  );
}
