/** Opens the system's file choice; nothing chosen: an empty list. Needs to be called from a user's action. */
export function chooseFiles(): Promise<readonly File[]> {
  const input = document.createElement('input');
  input.type = 'file';
  input.multiple = true;
  return new Promise((resolve) => {
    input.addEventListener('change', () => resolve([...(input.files ?? [])]));
    input.addEventListener('cancel', () => resolve([]));
    input.click();
  });
}
