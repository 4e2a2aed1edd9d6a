import type { Ref } from "react";
import {
  FieldError,
  Input,
  Label,
  Text,
  TextArea,
  TextField as AriaTextField,
  type TextFieldProps as AriaTextFieldProps,
} from "react-aria-components";
import { fieldStyle } from "./fieldStyle.ts";

export interface TextFieldProps extends Omit<AriaTextFieldProps, "className" | "children" | "style" | "ref"> {
  label: string;
  description?: string | undefined;
  error?: string | undefined;
  /** More than one makes it a text area. */
  rows?: number;
  placeholder?: string;
  /** The input itself, so that a form can put the focus there. */
  inputRef?: Ref<HTMLInputElement & HTMLTextAreaElement>;
}

/** A labelled text input with its explanation and what is wrong with it. */
export function TextField({ label, description, error, rows = 1, placeholder, inputRef, ...props }: TextFieldProps) {
  return (
    <AriaTextField {...props} validationBehavior="aria" isInvalid={error !== undefined} className={fieldStyle.root}>
      <Label className={fieldStyle.label}>{label}</Label>
      {rows > 1 ? (
        <TextArea ref={inputRef ?? null} rows={rows} placeholder={placeholder} className={fieldStyle.input} />
      ) : (
        <Input ref={inputRef ?? null} placeholder={placeholder} className={fieldStyle.input} />
      )}
      {description !== undefined && (
        <Text slot="description" className={fieldStyle.description}>
          {description}
        </Text>
      )}
      <FieldError className={fieldStyle.error}>{error}</FieldError>
    </AriaTextField>
  );
}
