/** What the field, choice or slider that an event comes from holds; empty where it comes from elsewhere. */
export function valueOf(event: Event): string {
  const { target } = event;
  return target instanceof HTMLInputElement ||
    target instanceof HTMLSelectElement ||
    target instanceof HTMLTextAreaElement
    ? target.value
    : '';
}
