import { Checkbox } from "../../components/Checkbox.tsx";
import { Select } from "../../components/Select.tsx";
import { TextField } from "../../components/TextField.tsx";
import type { DesignDraft, FieldErrors } from "./designDraft.ts";
import type { ChangeDraft } from "./DesignTab.tsx";

const METHODS = [
  { id: "BRR", label: "Balanced repeated replication (BRR)" },
  { id: "Fay", label: "Fay's method" },
  { id: "JK1", label: "Jackknife, one stratum (JK1)" },
  { id: "JKn", label: "Jackknife, several strata (JKn)" },
  { id: "bootstrap", label: "Bootstrap" },
  { id: "other", label: "Another, with its own factors" },
] as const;

/** Replicate weights: which columns, how they were made, and the factors that go with them. */
export function ReplicateFields({ draft, change, errors }: { draft: DesignDraft; change: ChangeDraft; errors: FieldErrors }) {
  return (
    <>
      <TextField
        label="Columns"
        value={draft.pattern}
        onChange={(pattern) => change({ pattern })}
        error={errors["replicates.pattern"]}
        placeholder="repwt1–repwt80"
        description="The first and the last, or a stem with an asterisk such as repwt*."
      />
      <Select label="Method" choices={METHODS} value={draft.method} onChange={(method) => change({ method })} />
      {draft.method === "Fay" && (
        <TextField
          label="Fay's factor"
          value={draft.fay}
          onChange={(fay) => change({ fay })}
          error={errors["replicates.fay"]}
          inputMode="decimal"
          description="From 0 to below 1; the survey's manual gives it, often 0.3 or 0.5."
        />
      )}
      <TextField
        label="Factor before the sum"
        value={draft.scale}
        onChange={(scale) => change({ scale })}
        error={errors["replicates.scale"]}
        inputMode="decimal"
        description="Leave it empty for the method's own, such as 1/R for BRR."
      />
      <TextField
        label="Factor of each replicate"
        value={draft.replicateScales}
        onChange={(replicateScales) => change({ replicateScales })}
        error={errors["replicates.replicateScales"]}
        description="One number for all, or one for each, separated by blanks. Needed for JKn."
      />
      <TextField
        label="Degrees of freedom"
        value={draft.degreesOfFreedom}
        onChange={(degreesOfFreedom) => change({ degreesOfFreedom })}
        error={errors["replicates.degreesOfFreedom"]}
        inputMode="numeric"
        description="Leave it empty for the number of replicates less one."
      />
      <Checkbox isSelected={draft.mse} onChange={(mse) => change({ mse })}>
        Deviations from the full-sample estimate
        <span className="block text-sm text-muted">Otherwise from the replicates&apos; own mean.</span>
      </Checkbox>
    </>
  );
}
