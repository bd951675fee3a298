/** Writes values into the fields of the page's form by their ids. */
export function fillForm(values: Record<string, string>): void {
  for (const [id, value] of Object.entries(values)) {
    const field = document.getElementById(id);
    if (field instanceof HTMLInputElement) field.value = value;
  }
}
