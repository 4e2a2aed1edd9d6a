import { FieldError, Label, RadioButton, RadioField, RadioGroup, Text } from "react-aria-components";
import { fieldStyle } from "./fieldStyle.ts";

export interface RadioChoicesProps<Value extends string> {
  label: string;
  choices: readonly { value: Value; label: string; detail?: string }[];
  value: Value;
  onChange: (value: Value) => void;
  description?: string | undefined;
  error?: string | undefined;
  isDisabled?: boolean;
}

/** One of a few, all in view with what each means. */
export function RadioChoices<Value extends string>({
  label,
  choices,
  value,
  onChange,
  description,
  error,
  isDisabled,
}: RadioChoicesProps<Value>) {
  return (
    <RadioGroup
      className={fieldStyle.root}
      value={value}
      onChange={(chosen) => {
        const choice = choices.find((each) => each.value === chosen);
        if (choice) onChange(choice.value);
      }}
      validationBehavior="aria"
      isInvalid={error !== undefined}
      isDisabled={isDisabled}
    >
      <Label className={fieldStyle.label}>{label}</Label>
      {description !== undefined && (
        <Text slot="description" className={fieldStyle.description}>
          {description}
        </Text>
      )}
      <div className="mt-1 flex flex-col gap-3">
        {choices.map((choice) => (
          <RadioField key={choice.value} value={choice.value}>
            <RadioButton className="group flex cursor-pointer items-start gap-2.5 data-[disabled]:cursor-default">
              <span
                aria-hidden="true"
                className="mt-0.5 flex size-5 shrink-0 items-center justify-center rounded-full border border-field bg-raised group-hover:border-action group-data-[focus-visible]:outline-2 group-data-[focus-visible]:outline-offset-2 group-data-[focus-visible]:outline-action group-data-[selected]:border-action"
              >
                <span className="size-2.5 rounded-full group-data-[selected]:bg-action" />
              </span>
              <span>
                {choice.label}
                {choice.detail !== undefined && <span className="block text-sm text-muted">{choice.detail}</span>}
              </span>
            </RadioButton>
          </RadioField>
        ))}
      </div>
      <FieldError className={fieldStyle.error}>{error}</FieldError>
    </RadioGroup>
  );
}
