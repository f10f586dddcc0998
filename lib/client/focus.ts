/** The first place that is wrong is where a person goes on; called after the errors are set, it waits for them to be drawn. */
export function focusFirstError(): void {
  requestAnimationFrame(() => document.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus());
}
