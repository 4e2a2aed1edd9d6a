import type { ReactNode } from "react";
import { Button as AriaButton, type ButtonProps as AriaButtonProps } from "react-aria-components";
import { buttonStyle, type ButtonKind } from "./buttonStyle.ts";

export interface ButtonProps extends Omit<AriaButtonProps, "className" | "children" | "style"> {
  kind?: ButtonKind;
  children: ReactNode;
  className?: string;
}

/** `isPending` keeps the focus and says that it is busy, while presses do nothing. */
export function Button({ kind = "quiet", className = "", children, ...props }: ButtonProps) {
  return (
    <AriaButton {...props} className={`${buttonStyle(kind)} ${className}`}>
      {children}
      {props.isPending && (
        <span aria-hidden="true" className="size-3.5 animate-spin rounded-full border-2 border-current border-t-transparent" />
      )}
    </AriaButton>
  );
}
