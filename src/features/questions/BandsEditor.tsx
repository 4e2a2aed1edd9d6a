import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Band } from "../../../shared/contracts/questions.ts";
import { Button } from "../../components/Button.tsx";
import { TextField } from "../../components/TextField.tsx";
import { bandPresets, bandsRemark, bandsText, readBands } from "./bands.ts";

/** Bands of a numeric variable: ready-made, or typed. */
export function BandsEditor({
  variable,
  bands,
  onUse,
}: {
  variable: VariableView;
  bands: readonly Band[] | null;
  onUse: (bands: Band[]) => void;
}) {
  const presets = bandPresets(variable);
  const [text, setText] = useState(bandsText(bands ?? presets[0]?.bands ?? []));
  const [isTried, setIsTried] = useState(false);
  const read = readBands(text);
  const remark = "bands" in read ? bandsRemark(read.bands, variable.isWhole) : null;
  return (
    <form
      className="space-y-4 px-4 pb-4"
      onSubmit={(event) => {
        event.preventDefault();
        setIsTried(true);
        if ("bands" in read) onUse(read.bands);
      }}
    >
      <div className="flex flex-wrap gap-2" role="group" aria-label="Ready-made bands">
        {presets.map((preset) => (
          <Button key={preset.name} onPress={() => setText(bandsText(preset.bands))}>
            {preset.name}
          </Button>
        ))}
      </div>
      <TextField
        label="Bands"
        rows={3}
        value={text}
        onChange={setText}
        autoFocus
        description={remark ?? "Both ends are in: 18–24, 25–34, 65+. A name may stand before: young: 18–24."}
        error={isTried && "problem" in read ? read.problem : undefined}
      />
      <Button kind="primary" type="submit">
        Split by these bands
      </Button>
    </form>
  );
}
