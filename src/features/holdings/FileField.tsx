import { useId, type ReactNode } from "react";
import { DropZone, FileTrigger, isFileDropItem } from "react-aria-components";
import { formatBytes } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { fieldStyle } from "../../components/fieldStyle.ts";

export interface FileFieldProps {
  label: string;
  file: File | null;
  onChange: (file: File | null) => void;
  description?: ReactNode;
  error?: string | undefined;
}

/** A file to choose, or to drop here. */
export function FileField({ label, file, onChange, description, error }: FileFieldProps) {
  const id = useId();
  return (
    <div role="group" aria-labelledby={`${id}-label`} aria-describedby={`${id}-description`} className={fieldStyle.root}>
      <span id={`${id}-label`} className={fieldStyle.label}>
        {label}
      </span>
      <DropZone
        aria-label={`Drop a file: ${label}`}
        className="flex flex-wrap items-center gap-x-4 gap-y-2 rounded-sm border border-dashed border-field px-4 py-3 data-[drop-target]:border-action data-[drop-target]:bg-action-soft"
        onDrop={(event) => {
          const dropped = event.items.find(isFileDropItem);
          if (dropped) void dropped.getFile().then(onChange);
        }}
      >
        <FileTrigger acceptedFileTypes={[".csv", ".txt", ".tsv", "text/csv"]} onSelect={(files) => onChange(files?.[0] ?? null)}>
          <Button aria-label={`Choose a file: ${label}`}>Choose a file</Button>
        </FileTrigger>
        {file ? (
          <span className="min-w-0 text-[0.9375rem] break-all">
            {file.name} <span className="text-muted">({formatBytes(file.size)})</span>{" "}
            <Button kind="plain" onPress={() => onChange(null)} aria-label={`Take ${file.name} out`}>
              Take out
            </Button>
          </span>
        ) : (
          <span className="text-sm text-muted">or drop it here</span>
        )}
      </DropZone>
      {description !== undefined && (
        <span id={`${id}-description`} className={fieldStyle.description}>
          {description}
        </span>
      )}
      {error !== undefined && (
        <span role="alert" className={fieldStyle.error}>
          {error}
        </span>
      )}
    </div>
  );
}
