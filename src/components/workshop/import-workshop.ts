/** [data-import]: sends a zip and says what became of it; hidden without script. */
const sentence = (value: unknown): string => {
  const error = value !== null && typeof value === 'object' && 'error' in value ? value.error : null;
  const message = error !== null && typeof error === 'object' && 'message' in error ? error.message : null;
  return typeof message === 'string' ? message : 'It could not be sent. Nothing was made. Try again.';
};

for (const form of document.querySelectorAll<HTMLFormElement>('[data-import]')) {
  form.hidden = false;
  const says = form.querySelector('[data-import-says]');
  const tell = (text: string) => {
    if (says !== null) says.textContent = text;
  };
  form.addEventListener('submit', async (event) => {
    event.preventDefault();
    const button = form.querySelector('button');
    if (button !== null) button.disabled = true;
    tell('On its way. A large one takes some minutes; leave this page open.');
    try {
      const answer = await fetch('/api/v1/workshops/import', { method: 'POST', body: new FormData(form) });
      const value: unknown = await answer.json();
      if (answer.ok) {
        tell(
          'It is there: a new workshop of yours, whose captures are being measured again. Go there by “Workshop”.',
        );
        form.reset();
      } else tell(sentence(value));
    } catch {
      tell(sentence(null));
    } finally {
      if (button !== null) button.disabled = false;
    }
  });
}
