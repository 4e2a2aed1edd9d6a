import { useMutation } from "@tanstack/react-query";
import { useState, type ReactNode } from "react";
import { Button } from "../components/Button.tsx";
import { messageOf } from "../lib/form.ts";
import { pictureOf, pngOf } from "./picture.ts";
import { fileName, saveFile } from "./saveFile.ts";
import { useWidth } from "./useWidth.ts";

type Format = "png" | "svg" | "csv";

export interface ChartFrameProps {
  /** What the picture is about, as a reader of a report would put it. */
  title: string;
  /** Where the figures come from; stands under saved pictures. */
  source: string;
  /** The same figures as a table. */
  headers: readonly string[];
  rows: readonly (readonly string[])[];
  /** The figures at full precision. */
  csv: () => string;
  /** Runs before anything is saved; a failure keeps it from being saved. */
  onSave: (format: Format) => Promise<unknown>;
  children: (width: number) => ReactNode;
}

/** Around every chart: its title, the same figures as a table, and its files. */
export function ChartFrame({ title, source, headers, rows, csv, onSave, children }: ChartFrameProps) {
  const [isTable, setIsTable] = useState(false);
  const { ref, width } = useWidth<HTMLDivElement>();
  const save = useMutation({
    mutationFn: async (format: Format) => {
      const drawing = ref.current?.querySelector("svg") ?? null;
      // Drawn before the wait: what is saved is what was seen.
      const picture = drawing && format !== "csv" ? pictureOf(drawing, title, source) : null;
      await onSave(format);
      const name = fileName(title, format);
      if (format === "csv") saveFile(name, new Blob(["\uFEFF", csv()], { type: "text/csv;charset=utf-8" }));
      else if (picture && format === "svg") saveFile(name, new Blob([picture.svg], { type: "image/svg+xml" }));
      else if (picture) saveFile(name, await pngOf(picture));
    },
  });
  return (
    <figure aria-label={title}>
      <div className="mb-3 flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
        <figcaption className="measure text-[1.0625rem] font-medium">{title}</figcaption>
        <div className="flex flex-wrap gap-x-4 no-print">
          <Button kind="plain" onPress={() => setIsTable(!isTable)} aria-pressed={isTable}>
            {isTable ? "As a picture" : "As a table"}
          </Button>
          {(isTable ? (["csv"] as const) : (["png", "svg", "csv"] as const)).map((format) => (
            <Button key={format} kind="plain" aria-label={`Download ${format.toUpperCase()}`} onPress={() => save.mutate(format)}>
              {format.toUpperCase()}
            </Button>
          ))}
        </div>
      </div>
      {save.isError && (
        <p role="alert" className="mb-3 text-sm text-wrong">
          Nothing was saved: {messageOf(save.error)}
        </p>
      )}
      {isTable ? (
        <FigureTable title={title} headers={headers} rows={rows} />
      ) : (
        <div ref={ref} className="w-full">
          {children(width)}
        </div>
      )}
    </figure>
  );
}

function FigureTable({ title, headers, rows }: Pick<ChartFrameProps, "title" | "headers" | "rows">) {
  return (
    <div role="region" aria-label={title} tabIndex={0} className="relative overflow-x-auto">
      <table className="w-full border-collapse text-table">
        <caption className="sr-only">{title}</caption>
        <thead>
          <tr className="border-b border-ink">
            {headers.map((header) => (
              <th key={header} scope="col" className="py-2 pr-6 text-left align-bottom font-semibold last:pr-0">
                {header}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map(([name = "", ...values]) => (
            <tr key={name} className="border-b border-line">
              <th scope="row" className="py-2 pr-6 text-left font-medium">
                {name}
              </th>
              {values.map((value, index) => (
                <td key={headers[index + 1]} className="py-2 pr-6 last:pr-0">
                  {value}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
