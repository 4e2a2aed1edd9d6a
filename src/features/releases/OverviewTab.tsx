import { useState } from "react";
import { useNavigate } from "react-router-dom";
import type { ReleaseView } from "../../../shared/contracts/holdings.ts";
import { formatCount, formatDate } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { ConfirmDialog } from "../../components/Dialog.tsx";
import { Facts } from "../../components/Facts.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Section } from "../../components/Page.tsx";
import { useRelease } from "./ReleaseLayout.tsx";
import { useRemoveRelease } from "./queries.ts";

/** What the release is, and what its steward does next. */
export function OverviewTab() {
  const release = useRelease();
  return (
    <div className="measure">
      <Section title="This release">
        <Facts
          facts={[
            { label: "Respondents", value: release.respondents === null ? "None yet" : formatCount(release.respondents) },
            { label: "Variables", value: formatCount(release.variables) },
            { label: "Brought in", value: formatDate(release.createdAt) },
            ...(release.publishedAt === null
              ? []
              : [
                  {
                    label: "Published",
                    value: `${formatDate(release.publishedAt)}${release.publishedBy === null ? "" : ` by ${release.publishedBy}`}`,
                  },
                ]),
            ...(release.checksum === null
              ? []
              : [
                  {
                    label: "Checksum of the columns (SHA-256)",
                    value: <code className="text-xs break-all">{release.checksum}</code>,
                  },
                ]),
          ]}
        />
      </Section>
      {release.can.publish && <NextSteps release={release} />}
      {release.status === "superseded" && (
        <p className="mt-8">A corrected release of this wave was published since. This one takes no questions any more.</p>
      )}
      {release.can.remove && <Removal release={release} />}
    </div>
  );
}

function NextSteps({ release }: { release: ReleaseView }) {
  const address = `/releases/${release.id}`;
  const steps = [
    { text: "Look through the codebook: labels, kinds, missing codes.", to: `${address}/codebook`, label: "Codebook" },
    {
      text: release.hasDesign
        ? "The design is declared; change it if need be."
        : "Declare the design: weight, strata, PSUs, disclosure minimums.",
      to: `${address}/design`,
      label: "Design",
    },
    { text: "Look at the readiness and publish.", to: `${address}/readiness`, label: "Readiness" },
  ];
  return (
    <Section title="Before it can be asked of">
      <ol className="space-y-3">
        {steps.map(({ text, to, label }, i) => (
          <li key={to} className="flex flex-wrap items-center justify-between gap-x-6 gap-y-1 border-b border-line pb-3">
            <span>
              {i + 1}. {text}
            </span>
            <LinkButton to={to}>{label}</LinkButton>
          </li>
        ))}
      </ol>
    </Section>
  );
}

function Removal({ release }: { release: ReleaseView }) {
  const [isOpen, setIsOpen] = useState(false);
  const remove = useRemoveRelease(release.id);
  const navigate = useNavigate();
  return (
    <div className="mt-12">
      <Button kind="danger" onPress={() => setIsOpen(true)}>
        Remove this draft
      </Button>
      <ConfirmDialog
        title={`Remove the draft of ${release.wave}?`}
        isOpen={isOpen}
        onClose={() => setIsOpen(false)}
        confirm="Remove"
        isDanger
        isPending={remove.isPending}
        error={remove.error}
        onConfirm={() => remove.mutate(undefined, { onSuccess: () => void navigate(`/surveys/${release.surveyId}`) })}
      >
        <p>Its microdata and codebook are deleted for good. The ledger keeps that it was here.</p>
      </ConfirmDialog>
    </div>
  );
}
