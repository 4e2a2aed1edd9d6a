import { useController, type Control, type FieldPath, type FieldValues } from "react-hook-form";
import { CheckboxGroup, type CheckboxGroupProps } from "./Checkbox.tsx";
import { Chooser, type ChooserProps } from "./Chooser.tsx";
import { Notice } from "./Notice.tsx";
import { TextField, type TextFieldProps } from "./TextField.tsx";

/** Which field of which form; everything else is the plain component's. */
interface Bound<Values extends FieldValues, Sent> {
  control: Control<Values, unknown, Sent>;
  name: FieldPath<Values>;
}
type Given = "value" | "onChange" | "onBlur" | "error" | "name" | "inputRef";

export function FormTextField<Values extends FieldValues, Sent>({
  control,
  name,
  ...props
}: Bound<Values, Sent> & Omit<TextFieldProps, Given>) {
  const { field, fieldState } = useController({ control, name });
  const value: unknown = field.value;
  return (
    <TextField
      {...props}
      name={field.name}
      value={typeof value === "string" ? value : ""}
      onChange={field.onChange}
      onBlur={field.onBlur}
      inputRef={field.ref}
      error={fieldState.error?.message}
    />
  );
}

export function FormChooser<Values extends FieldValues, Sent>({
  control,
  name,
  ...props
}: Bound<Values, Sent> & Omit<ChooserProps, Given>) {
  const { field, fieldState } = useController({ control, name });
  const value: unknown = field.value;
  return (
    <Chooser
      {...props}
      value={typeof value === "string" && value !== "" ? value : null}
      onChange={field.onChange}
      onBlur={field.onBlur}
      inputRef={field.ref}
      error={fieldState.error?.message}
    />
  );
}

export function FormCheckboxGroup<Values extends FieldValues, Sent, Value extends string>({
  control,
  name,
  ...props
}: Bound<Values, Sent> & Omit<CheckboxGroupProps<Value>, Given>) {
  const { field, fieldState } = useController({ control, name });
  const chosen: unknown = field.value;
  const value = props.choices.map((choice) => choice.value).filter((choice) => Array.isArray(chosen) && chosen.includes(choice));
  return <CheckboxGroup {...props} value={value} onChange={field.onChange} error={fieldState.error?.message} />;
}

/** What is wrong with the form as a whole; read out at once. */
export function FormError({ message }: { message: string | undefined }) {
  return message === undefined ? null : <Notice kind="wrong">{message}</Notice>;
}
