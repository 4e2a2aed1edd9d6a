import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Link } from "react-router-dom";
import type { ReadinessView } from "../../../shared/contracts/readiness.ts";
import {
  formatCount,
  formatCounted,
  formatNumber,
  formatPeople,
  formatPercent,
  formatSignificant,
} from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { ConfirmDialog } from "../../components/Dialog.tsx";
import { Facts } from "../../components/Facts.tsx";
import { Notice } from "../../components/Notice.tsx";
import { Section } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { readinessQuery, usePublish } from "./queries.ts";
import { useRelease } from "./ReleaseLayout.tsx";
import { WeightHistogram } from "./WeightHistogram.tsx";

const MISSING_SHOWN = 12;

/** The release's checks: what is wrong with it, what is to be known, and then publication. */
export function ReadinessTab() {
  const release = useRelease();
  const readiness = useQuery(readinessQuery(release.id));
  if (readiness.isPending) return <PageLoading what="the checks" />;
  if (readiness.isError) return <PageError error={readiness.error} onRetry={readiness.refetch} />;
  const view = readiness.data;
  return (
    <>
      <Findings view={view} releaseId={release.id} isDraft={release.status === "draft"} />
      {release.status === "draft" && <Publication view={view} wave={release.wave} survey={release.surveyTitle} />}
      <div className="mt-12 grid gap-x-16 gap-y-12 lg:grid-cols-2">
        <div>
          <Section title="Sample">
            <Facts
              facts={[
                { label: "Respondents", value: formatCount(view.respondents) },
                {
                  label: "Sum of weights",
                  value: view.sumOfWeights === null ? "Not known yet" : formatPeople(view.sumOfWeights),
                  note: "The people the sample stands for",
                },
                { label: "Strata", value: formatCount(view.strata) },
                { label: "PSUs", value: formatCount(view.psus) },
                { label: "Degrees of freedom", value: formatCount(view.degreesOfFreedom) },
                { label: "Strata with a single PSU", value: formatCount(view.lonelyPsus) },
              ]}
            />
          </Section>
        </div>
        <div>
          <Section title="Missing values" lead="Share of respondents without a value.">
            <MissingShares missing={view.missing} />
          </Section>
        </div>
      </div>
      {view.weight && (
        <div className="mt-12">
          <Section title="Weights">
            <div className="grid gap-x-16 gap-y-8 lg:grid-cols-2">
              <Facts
                facts={[
                  { label: "Least", value: formatSignificant(view.weight.minimum) },
                  { label: "Median", value: formatSignificant(view.weight.median) },
                  { label: "Greatest", value: formatSignificant(view.weight.maximum) },
                  { label: "Respondents of weight 0", value: formatCount(view.weight.zero) },
                  {
                    label: "Effect of uneven weights",
                    value: formatNumber(view.weight.kishEffect, 2),
                    note: "How many times wider variances are by that alone (Kish 1965)",
                  },
                ]}
              />
              <WeightHistogram bins={view.weight.histogram} />
            </div>
          </Section>
        </div>
      )}
    </>
  );
}

function Findings({ view, releaseId, isDraft }: { view: ReadinessView; releaseId: string; isDraft: boolean }) {
  const faults = view.findings.filter(({ severity }) => severity === "fault");
  const remarks = view.findings.filter(({ severity }) => severity === "remark");
  return (
    <div className="measure space-y-4" aria-label="What the checks found" role="region">
      {faults.length === 0 && (
        <Notice kind="done">{isDraft ? "Nothing stands in the way of publication." : "The checks found no fault."}</Notice>
      )}
      {faults.map(({ kind, message, remedy }) => (
        <Notice key={kind} kind="wrong" title={message}>
          {remedy}{" "}
          {kind === "no-design" && (
            <Link className="link" to={`/releases/${releaseId}/design`}>
              Declare the design
            </Link>
          )}
        </Notice>
      ))}
      {remarks.map(({ kind, message }) => (
        <Notice key={`${kind} ${message}`}>{message}</Notice>
      ))}
    </div>
  );
}

function Publication({ view, wave, survey }: { view: ReadinessView; wave: string; survey: string }) {
  const [isOpen, setIsOpen] = useState(false);
  const publish = usePublish(view.releaseId);
  const faults = view.findings.filter(({ severity }) => severity === "fault").length;
  return (
    <div className="mt-8">
      <Button kind="primary" isDisabled={!view.can.publish} onPress={() => setIsOpen(true)}>
        Publish
      </Button>
      {!view.can.publish && faults > 0 && (
        <p className="mt-2 text-sm text-muted">{formatCounted(faults, "fault")} to mend first.</p>
      )}
      <ConfirmDialog
        title={`Publish ${wave}?`}
        isOpen={isOpen}
        onClose={() => setIsOpen(false)}
        confirm="Publish"
        isPending={publish.isPending}
        error={publish.error}
        onConfirm={() => publish.mutate(undefined, { onSuccess: () => setIsOpen(false) })}
      >
        <p>
          Everyone with access to “{survey}” can ask of it from then on. Its microdata, codebook and design stay as they are now;
          a correction is another release.
        </p>
        <p>A release of the same wave that was published before becomes superseded.</p>
      </ConfirmDialog>
    </div>
  );
}

function MissingShares({ missing }: { missing: ReadinessView["missing"] }) {
  const [isAll, setIsAll] = useState(false);
  const some = missing.filter(({ share }) => share > 0);
  if (some.length === 0) return <p className="text-muted">Every respondent has a value in every variable.</p>;
  return (
    <>
      <Facts
        facts={(isAll ? some : some.slice(0, MISSING_SHOWN)).map(({ variable, label, share }) => ({
          label: label === "" ? variable : label,
          value: formatPercent(share),
        }))}
      />
      {some.length > MISSING_SHOWN && !isAll && (
        <Button kind="plain" onPress={() => setIsAll(true)}>
          {`Show all ${some.length}`}
        </Button>
      )}
    </>
  );
}
