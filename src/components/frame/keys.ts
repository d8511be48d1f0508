/** `/` goes to the search, `?` lists the keys. Both can be switched off, and neither acts while something is typed. */
const OFF = 'gapmark.keys';

const dialog = document.querySelector<HTMLDialogElement>('#keys');
const toggle = document.querySelector<HTMLInputElement>('[data-keys-on]');

const typing = (target: EventTarget | null) =>
  target instanceof HTMLElement &&
  (target.isContentEditable || target.closest('input, select, textarea, [data-own-keys]') !== null);

function openSearch(): void {
  const field = document.querySelector<HTMLInputElement>('[data-search]');
  if (field === null) location.assign('/captures#search');
  else field.focus();
}

if (toggle !== null) {
  toggle.checked = localStorage.getItem(OFF) !== 'off';
  toggle.addEventListener('change', () => {
    if (toggle.checked) localStorage.removeItem(OFF);
    else localStorage.setItem(OFF, 'off');
  });
}

for (const opener of document.querySelectorAll<HTMLElement>('[data-keys-open]')) {
  opener.hidden = false;
  opener.addEventListener('click', () => dialog?.showModal());
}
for (const opener of document.querySelectorAll<HTMLElement>('[data-search-open]')) {
  opener.addEventListener('click', (event) => {
    event.preventDefault();
    openSearch();
  });
}
if (location.hash === '#search') document.querySelector<HTMLInputElement>('[data-search]')?.focus();

document.addEventListener('keydown', (event) => {
  if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return;
  if (typing(event.target) || toggle?.checked === false || document.querySelector('dialog[open]') !== null)
    return;
  if (event.key === '/') {
    event.preventDefault();
    openSearch();
  } else if (event.key === '?') dialog?.showModal();
});
