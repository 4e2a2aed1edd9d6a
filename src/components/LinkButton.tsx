import { Link, type LinkProps } from "react-router-dom";
import { buttonStyle, type ButtonKind } from "./buttonStyle.ts";

/** A link that looks like a button: for going somewhere, never for changing something. */
export function LinkButton({ kind = "quiet", className = "", ...props }: LinkProps & { kind?: ButtonKind; className?: string }) {
  return <Link {...props} className={`${buttonStyle(kind)} ${className}`} />;
}

/** The same for files the server makes. */
export function DownloadLink({ href, kind = "quiet", children }: { href: string; kind?: ButtonKind; children: string }) {
  return (
    <a href={href} download className={buttonStyle(kind)}>
      {children}
    </a>
  );
}
