import { Check } from "lucide-react";
import type { ReactNode } from "react";
import {
  CheckboxButton,
  CheckboxField,
  CheckboxGroup as AriaCheckboxGroup,
  FieldError,
  Label,
  Text,
} from "react-aria-components";
import { fieldStyle } from "./fieldStyle.ts";

export interface CheckboxProps {
  children: ReactNode;
  /** Its name inside a group. */
  value?: string;
  isSelected?: boolean;
  onChange?: (isSelected: boolean) => void;
  isDisabled?: boolean;
  "aria-label"?: string;
}

/** A box to tick, alone or in a group. */
export function Checkbox({ children, ...props }: CheckboxProps) {
  return (
    <CheckboxField {...props}>
      <CheckboxButton className="group flex min-h-6 cursor-pointer items-start gap-2.5 data-[disabled]:cursor-default data-[disabled]:text-muted">
        <span
          aria-hidden="true"
          className="mt-0.5 flex size-5 shrink-0 items-center justify-center rounded-xs border border-field bg-raised text-on-action group-hover:border-action group-data-[focus-visible]:outline-2 group-data-[focus-visible]:outline-offset-2 group-data-[focus-visible]:outline-action group-data-[selected]:border-action group-data-[selected]:bg-action"
        >
          <Check className="hidden size-4 stroke-3 group-data-[selected]:block" />
        </span>
        <span>{children}</span>
      </CheckboxButton>
    </CheckboxField>
  );
}

export interface CheckboxGroupProps<Value extends string> {
  label: string;
  choices: readonly { value: Value; label: ReactNode; isDisabled?: boolean }[];
  value: readonly Value[];
  onChange: (value: Value[]) => void;
  description?: string | undefined;
  error?: string | undefined;
}

/** Any number of a few. */
export function CheckboxGroup<Value extends string>({
  label,
  choices,
  value,
  onChange,
  description,
  error,
}: CheckboxGroupProps<Value>) {
  return (
    <AriaCheckboxGroup
      className={fieldStyle.root}
      value={[...value]}
      onChange={(chosen) => onChange(choices.map((choice) => choice.value).filter((choice) => chosen.includes(choice)))}
      validationBehavior="aria"
      isInvalid={error !== undefined}
    >
      <Label className={fieldStyle.label}>{label}</Label>
      {description !== undefined && (
        <Text slot="description" className={fieldStyle.description}>
          {description}
        </Text>
      )}
      <div className="mt-1 flex flex-col gap-2">
        {choices.map((choice) => (
          <Checkbox key={choice.value} value={choice.value} isDisabled={choice.isDisabled ?? false}>
            {choice.label}
          </Checkbox>
        ))}
      </div>
      <FieldError className={fieldStyle.error}>{error}</FieldError>
    </AriaCheckboxGroup>
  );
}
