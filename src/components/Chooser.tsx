import { ChevronDown } from "lucide-react";
import type { Ref } from "react";
import { Button, ComboBox, FieldError, Input, Label, ListBox, ListBoxItem, Popover, Text } from "react-aria-components";
import { fieldStyle } from "./fieldStyle.ts";

export interface Choice {
  id: string;
  label: string;
  /** What helps to choose: shown under the label, and searched too. */
  detail?: string | undefined;
}

export interface ChooserProps {
  label: string;
  choices: readonly Choice[];
  value: string | null;
  onChange: (id: string | null) => void;
  onBlur?: () => void;
  description?: string | undefined;
  error?: string | undefined;
  placeholder?: string;
  isDisabled?: boolean;
  inputRef?: Ref<HTMLInputElement>;
}

const holds = (text: string, typed: string) => text.toLocaleLowerCase().includes(typed.trim().toLocaleLowerCase());

/** One of many, found by typing any part of its name or detail. Clearing the text clears the choice. */
export function Chooser({
  label,
  choices,
  value,
  onChange,
  onBlur,
  description,
  error,
  placeholder,
  isDisabled,
  inputRef,
}: ChooserProps) {
  const textOf = new Map(choices.map((choice) => [choice.label, `${choice.label} ${choice.detail ?? ""}`]));
  return (
    <ComboBox
      className={fieldStyle.root}
      defaultItems={choices}
      value={value}
      onChange={(key) => onChange(key === null ? null : String(key))}
      onBlur={onBlur}
      defaultFilter={(name, typed) => holds(textOf.get(name) ?? name, typed)}
      menuTrigger="focus"
      validationBehavior="aria"
      isInvalid={error !== undefined}
      isDisabled={isDisabled}
      allowsEmptyCollection
    >
      <Label className={fieldStyle.label}>{label}</Label>
      <div className="relative">
        <Input ref={inputRef ?? null} placeholder={placeholder} className={`${fieldStyle.input} pr-10`} />
        <Button className="absolute inset-y-0 right-0 flex w-10 items-center justify-center text-muted hover:text-action">
          <ChevronDown aria-hidden="true" className="size-4" />
        </Button>
      </div>
      {description !== undefined && (
        <Text slot="description" className={fieldStyle.description}>
          {description}
        </Text>
      )}
      <FieldError className={fieldStyle.error}>{error}</FieldError>
      <Popover className={fieldStyle.popover}>
        <ListBox<Choice>
          className="py-1 outline-none"
          renderEmptyState={() => <p className="px-3 py-2 text-sm text-muted">Nothing by that name.</p>}
        >
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
    </ComboBox>
  );
}
