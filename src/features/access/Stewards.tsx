import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Button } from "../../components/Button.tsx";
import { CheckboxGroup } from "../../components/Checkbox.tsx";
import { Dialog } from "../../components/Dialog.tsx";
import { Notice } from "../../components/Notice.tsx";
import { Section } from "../../components/Page.tsx";
import { messageOf } from "../../lib/form.ts";
import { useSession } from "../../lib/session.tsx";
import { surveyQuery } from "../../lib/surveys.ts";
import { candidatesQuery, useSetStewards } from "./queries.ts";

/** Who looks after the survey, and a way to share or hand over that charge. */
export function Stewards({ surveyId }: { surveyId: string }) {
  const survey = useQuery(surveyQuery(surveyId));
  const [isOpen, setIsOpen] = useState(false);
  if (!survey.data) return null;
  const names = survey.data.stewards.map(({ name }) => name).join(", ");
  return (
    <Section
      title="Stewards"
      lead="They bring in releases, declare the design, publish, and decide here who may use the survey."
      actions={
        survey.data.can.manageAccess && (
          <Button kind="plain" onPress={() => setIsOpen(true)}>
            Change the stewards
          </Button>
        )
      }
    >
      <p>{names}</p>
      <Dialog title="Stewards of this survey" isOpen={isOpen} onClose={() => setIsOpen(false)}>
        <StewardsForm surveyId={surveyId} present={survey.data.stewards.map(({ id }) => id)} onClose={() => setIsOpen(false)} />
      </Dialog>
    </Section>
  );
}

function StewardsForm({ surveyId, present, onClose }: { surveyId: string; present: string[]; onClose: () => void }) {
  const { person } = useSession();
  const candidates = useQuery(candidatesQuery(surveyId));
  const set = useSetStewards(surveyId);
  const [chosen, setChosen] = useState<readonly string[]>(present);
  const people = (candidates.data?.people ?? []).filter(({ roles }) => roles.includes("steward"));
  const leaves = present.includes(person.id) && !chosen.includes(person.id);
  return (
    <div className="space-y-5">
      {set.isError && <Notice kind="wrong">{messageOf(set.error)}</Notice>}
      <CheckboxGroup
        label="Data stewards"
        choices={people.map(({ id, name }) => ({ value: id, label: name }))}
        value={chosen}
        onChange={setChosen}
        error={chosen.length === 0 ? "A survey needs a steward." : undefined}
      />
      {leaves && (
        <Notice kind="caution">You take yourself off: unless you have a grant, you won't see this survey any more.</Notice>
      )}
      <div className="flex flex-wrap justify-end gap-3">
        <Button onPress={onClose}>Leave it</Button>
        <Button
          kind="primary"
          isDisabled={chosen.length === 0}
          isPending={set.isPending}
          onPress={() => set.mutate([...chosen], { onSuccess: onClose })}
        >
          Keep the changes
        </Button>
      </div>
    </div>
  );
}
