/** The key belongs to a field that is being written in, not to the screen. */
export function isForField(event: KeyboardEvent): boolean {
  return (
    event.target instanceof HTMLElement && event.target.closest('input, textarea, select, [contenteditable]') !== null
  );
}

/** The key belongs to a button or link that has the focus. */
export function isForControl(event: KeyboardEvent): boolean {
  return event.target instanceof HTMLElement && event.target.closest('button, a, [role=button]') !== null;
}
