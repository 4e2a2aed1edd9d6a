import { useMutation } from "@tanstack/react-query";
import type { Table } from "../../../shared/contracts/tables.ts";
import { fileName, saveFile } from "../../charts/saveFile.ts";
import { Button } from "../../components/Button.tsx";
import { messageOf } from "../../lib/form.ts";
import type { Measure } from "./measures.ts";
import { tableBundle } from "./bundle.ts";
import { fetchScript, recordDownload } from "./queries.ts";
import { tableCsv } from "./tableCsv.ts";
import { tableText } from "./tableText.ts";

/** Takes the table away: copied as text or saved as CSV, once the ledger knows. */
export function TakeAway({ table, measures }: { table: Table; measures: readonly Measure[] }) {
  const copy = useMutation({
    mutationFn: async () => {
      await recordDownload(table.question, "text");
      await navigator.clipboard.writeText(tableText(table, measures));
    },
  });
  const download = useMutation({
    mutationFn: async () => {
      await recordDownload(table.question, "csv");
      // The mark at the start tells spreadsheets that the text is UTF-8.
      saveFile(fileName(table.caption, "csv"), new Blob(["\uFEFF", tableCsv(table)], { type: "text/csv;charset=utf-8" }));
    },
  });
  const bundle = useMutation({
    mutationFn: async () => {
      const { script } = await fetchScript(table.question);
      await recordDownload(table.question, "bundle");
      saveFile(fileName(table.caption, "zip"), new Blob([tableBundle(table, script)], { type: "application/zip" }));
    },
  });
  const error = copy.error ?? download.error ?? bundle.error;
  return (
    <div className="flex flex-wrap items-center gap-x-4 no-print">
      <Button kind="plain" onPress={() => copy.mutate()} isPending={copy.isPending}>
        Copy
      </Button>
      <Button kind="plain" onPress={() => download.mutate()} isPending={download.isPending}>
        Download CSV
      </Button>
      <Button kind="plain" onPress={() => bundle.mutate()} isPending={bundle.isPending}>
        Reproduce it
      </Button>
      <span role="status" className="text-[0.8125rem] text-muted">
        {copy.isSuccess ? "Copied" : ""}
      </span>
      {error && (
        <span role="alert" className="text-[0.8125rem] text-wrong">
          Nothing was taken away: {messageOf(error)}
        </span>
      )}
    </div>
  );
}
