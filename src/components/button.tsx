import type { ComponentProps } from "react";
import { Link, type LinkProps } from "react-router-dom";

interface Look {
  /** One filled button a screen. */
  readonly filled?: boolean;
}

const buttonClass = (filled: boolean | undefined, className = "") =>
  `button ${filled ? "button-filled" : ""} ${className}`;

export function Button({ filled, className, type = "button", ...rest }: ComponentProps<"button"> & Look) {
  return <button type={type} className={buttonClass(filled, className)} {...rest} />;
}

export function LinkButton({ filled, className, ...rest }: LinkProps & Look) {
  return <Link className={buttonClass(filled, className)} {...rest} />;
}

interface WordLook {
  /** Beside a button, of less weight. */
  readonly quiet?: boolean;
}

const wordClass = (quiet: boolean | undefined, className = "") => `word ${quiet ? "word-quiet" : ""} ${className}`;

/** An action as a word. */
export function Word({ quiet, className, type = "button", ...rest }: ComponentProps<"button"> & WordLook) {
  return <button type={type} className={wordClass(quiet, className)} {...rest} />;
}

export function LinkWord({ quiet, className, ...rest }: LinkProps & WordLook) {
  return <Link className={wordClass(quiet, className)} {...rest} />;
}
