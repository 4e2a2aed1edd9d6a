import { ChevronDown } from "lucide-react";
import {
  Button,
  FieldError,
  Label,
  ListBox,
  ListBoxItem,
  Popover,
  Select as AriaSelect,
  SelectValue,
  Text,
} from "react-aria-components";
import type { Choice } from "./Chooser.tsx";
import { fieldStyle } from "./fieldStyle.ts";

export interface SelectProps<Id extends string> {
  label: string;
  choices: readonly (Choice & { id: Id })[];
  value: Id;
  onChange: (id: Id) => void;
  description?: string | undefined;
  error?: string | undefined;
  isDisabled?: boolean;
}

/** One of a few, all known by heart. For long lists take `Chooser`, which can be typed into. */
export function Select<Id extends string>({ label, choices, value, onChange, description, error, isDisabled }: SelectProps<Id>) {
  return (
    <AriaSelect
      className={fieldStyle.root}
      value={value}
      onChange={(key) => {
        const choice = choices.find(({ id }) => id === key);
        if (choice) onChange(choice.id);
      }}
      validationBehavior="aria"
      isInvalid={error !== undefined}
      isDisabled={isDisabled}
    >
      <Label className={fieldStyle.label}>{label}</Label>
      <Button className={`${fieldStyle.input} flex items-center justify-between gap-2 text-left`}>
        <SelectValue className="truncate [&_[slot=description]]:hidden" />
        <ChevronDown aria-hidden="true" className="size-4 shrink-0 text-muted" />
      </Button>
      {description !== undefined && (
        <Text slot="description" className={fieldStyle.description}>
          {description}
        </Text>
      )}
      <FieldError className={fieldStyle.error}>{error}</FieldError>
      <Popover className={fieldStyle.popover}>
        <ListBox<Choice> items={choices} className="py-1 outline-none">
          {(choice) => (
            <ListBoxItem id={choice.id} textValue={choice.label} className={fieldStyle.option}>
              <Text slot="label">{choice.label}</Text>
              {choice.detail !== undefined && (
                <Text slot="description" className="block text-sm font-normal text-muted">
                  {choice.detail}
                </Text>
              )}
            </ListBoxItem>
          )}
        </ListBox>
      </Popover>
    </AriaSelect>
  );
}
