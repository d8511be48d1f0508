/** [data-show-password] shows what is typed in the field that it controls; hidden without script. */
for (const button of document.querySelectorAll<HTMLButtonElement>('[data-show-password]')) {
  const field = document.getElementById(button.getAttribute('aria-controls') ?? '');
  if (!(field instanceof HTMLInputElement)) continue;
  button.hidden = false;
  button.addEventListener('click', () => {
    const shown = field.type === 'text';
    field.type = shown ? 'password' : 'text';
    button.setAttribute('aria-pressed', String(!shown));
    button.textContent = shown ? 'Show' : 'Hide';
  });
}
