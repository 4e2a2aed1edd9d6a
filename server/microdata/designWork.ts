import type { Design } from "../../shared/contracts/design.ts";
import { asNumbers, assembleColumn } from "./columns.ts";
import type { CodebookVariable } from "./codebook.ts";
import { layoutFor, readDesignData } from "./designData.ts";
import { layoutParts, type LayoutParts } from "./layoutParts.ts";
import { readinessFacts, type ReadinessFacts } from "./readinessFacts.ts";
import type { Segment } from "./segments.ts";

/** A design with the columns that it reads. */
export interface DesignWork {
  design: Design;
  rows: number;
  columns: { variable: CodebookVariable; segments: Segment[]; isReplicate: boolean }[];
}

/** The worker's entry: lays the release out as the design says and checks what it says. */
export default function designWork({ design, rows, columns }: DesignWork): { layout: LayoutParts; facts: ReadinessFacts } {
  const replicates = new Map<string, Float64Array>();
  const loaded = new Map(
    columns.flatMap(({ variable, segments, isReplicate }) => {
      const column = assembleColumn(variable.storage, segments, rows);
      if (isReplicate) replicates.set(variable.name, asNumbers(column, variable));
      return isReplicate ? [] : [[variable.name, { variable, column }] as const];
    }),
  );
  const data = readDesignData(design, loaded);
  const layout = layoutFor(data, rows);
  return { layout: layoutParts(layout), facts: readinessFacts(design, data, layout, rows, replicates) };
}
