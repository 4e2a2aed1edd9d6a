import type { Design } from "../../../shared/contracts/design.ts";
import { EmptyState } from "../../components/EmptyState.tsx";
import { Facts } from "../../components/Facts.tsx";
import { LONELY_RULES } from "./lonelyRules.ts";

const nameOf = (names: string | string[] | null, none: string) =>
  names === null ? none : Array.isArray(names) ? names.join(", then ") : names;

/** A published release's design, which stays as it is. */
export function DesignFacts({ design }: { design: Design | null }) {
  if (!design)
    return (
      <EmptyState title="No design was declared">
        <p>This release was never published.</p>
      </EmptyState>
    );
  const { replicates, minimums } = design;
  return (
    <div className="measure">
      <Facts
        facts={[
          { label: "Weight", value: design.weight ?? "Everyone counts the same" },
          ...(replicates
            ? [{ label: "Replicate weights", value: `${replicates.pattern} (${replicates.method})` }]
            : [
                { label: "Stratum", value: design.strata ?? "One stratum" },
                { label: "PSU", value: nameOf(design.psu, "Each respondent") },
                { label: "Population size", value: nameOf(design.populationSize, "Not used") },
                {
                  label: "A stratum with a single PSU",
                  value: LONELY_RULES.find(({ value }) => value === design.lonely)?.label ?? design.lonely,
                },
              ]),
          { label: "Fewest respondents shown", value: minimums.respondents },
          { label: "Fewest affected shown", value: minimums.affected },
          { label: "Fewest not affected shown", value: minimums.unaffected },
        ]}
      />
      <p className="mt-4 text-sm text-muted">A published release keeps its design. To change it, bring in a new release.</p>
    </div>
  );
}
