import { TextField } from "../../components/TextField.tsx";
import type { DesignDraft, FieldErrors } from "./designDraft.ts";
import type { ChangeDraft } from "./DesignTab.tsx";

/** Disclosure minimums. */
export function MinimumFields({ draft, change, errors }: { draft: DesignDraft; change: ChangeDraft; errors: FieldErrors }) {
  return (
    <div className="grid gap-5 sm:grid-cols-3">
      <TextField
        label="Fewest respondents"
        value={draft.respondents}
        onChange={(respondents) => change({ respondents })}
        error={errors["minimums.respondents"]}
        inputMode="numeric"
      />
      <TextField
        label="Fewest affected"
        value={draft.affected}
        onChange={(affected) => change({ affected })}
        error={errors["minimums.affected"]}
        inputMode="numeric"
      />
      <TextField
        label="Fewest not affected"
        value={draft.unaffected}
        onChange={(unaffected) => change({ unaffected })}
        error={errors["minimums.unaffected"]}
        inputMode="numeric"
      />
    </div>
  );
}
