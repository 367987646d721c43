/** Id of the control of a form field, from its path: `carers[0].email` becomes `field-carers-0-email`. */
export const fieldId = (name: string) => `field-${name.replace(/[^a-zA-Z0-9]+/g, '-').replace(/-$/, '')}`

/** Moves focus to a field: its control, or the first control inside when the id is on a group. */
export function focusField(name: string): void {
  const target = document.getElementById(fieldId(name)) ?? document.getElementById(`${fieldId(name)}-label`)
  if (!target) return
  const controls = 'input, select, textarea, button, [tabindex="0"], [contenteditable="true"]'
  const group = target.matches('legend') ? target.closest('fieldset') : target
  const control = target.matches(controls) ? target : group?.querySelector<HTMLElement>(controls)
  const reached = control ?? target
  reached.scrollIntoView({ block: 'center' })
  reached.focus({ preventScroll: true })
}
