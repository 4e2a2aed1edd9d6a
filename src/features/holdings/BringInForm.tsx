import { useRef, useState } from "react";
import { Button } from "../../components/Button.tsx";
import { Notice } from "../../components/Notice.tsx";
import { TextField } from "../../components/TextField.tsx";
import { messageOf } from "../../lib/form.ts";
import { ApiError } from "../../lib/request.ts";
import { FileField } from "./FileField.tsx";
import { useSendRelease } from "./queries.ts";

type Fields = Record<string, string>;

function check(wave: string, microdata: File | null): Fields {
  return {
    ...(wave.trim() === "" ? { wave: "Name the wave, such as 2025." } : {}),
    ...(microdata === null ? { microdata: "Choose the file that holds the microdata." } : {}),
  };
}

/** The files of a release and its name. The import goes on by itself once they have arrived. */
export function BringInForm({ surveyId }: { surveyId: string }) {
  const send = useSendRelease(surveyId);
  const [wave, setWave] = useState("");
  const [microdata, setMicrodata] = useState<File | null>(null);
  const [codebook, setCodebook] = useState<File | null>(null);
  const [wrong, setWrong] = useState<Fields>({});
  const waveInput = useRef<HTMLInputElement & HTMLTextAreaElement>(null);
  const submit = () => {
    const faults = check(wave, microdata);
    setWrong(faults);
    if (microdata === null || Object.keys(faults).length > 0) {
      if (faults.wave !== undefined) waveInput.current?.focus();
      return;
    }
    const form = new FormData();
    form.set("wave", wave);
    form.set("microdata", microdata);
    if (codebook) form.set("codebook", codebook);
    send.mutate(form, {
      onSuccess: () => {
        setWave("");
        setMicrodata(null);
        setCodebook(null);
      },
      onError: (error) => setWrong(error instanceof ApiError ? (error.problem.fields ?? {}) : {}),
    });
  };
  return (
    <form
      noValidate
      className="measure space-y-5"
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
    >
      {send.isError && <Notice kind="wrong">{messageOf(send.error)}</Notice>}
      <TextField
        label="Wave"
        value={wave}
        onChange={setWave}
        error={wrong.wave}
        inputRef={waveInput}
        description="What tells this release from its siblings, such as 2025."
      />
      <FileField
        label="Microdata (CSV)"
        file={microdata}
        onChange={setMicrodata}
        error={wrong.microdata}
        description="UTF-8; separated by commas, semicolons or tabs; empty cells are missing values. Up to 2 GB."
      />
      <FileField
        label="Codebook (CSV), if there is one"
        file={codebook}
        onChange={setCodebook}
        error={wrong.codebook}
        description={
          <>
            Columns: variable, label, kind, code, category label, missing.{" "}
            <a className="link" href="/api/codebook-template.csv" download>
              Download an example
            </a>
          </>
        }
      />
      <Button type="submit" kind="primary" isPending={send.isPending}>
        {send.isPending ? "Sending the files" : "Bring in the release"}
      </Button>
    </form>
  );
}
