import { areSingleKeysOn, isTyping, setSingleKeys } from './singleKeys';

document.addEventListener('keydown', (event) => {
  if (event.key !== '?' || event.ctrlKey || event.metaKey || event.altKey) return;
  if (!areSingleKeysOn() || isTyping(event) || document.querySelector('dialog[open]')) return;
  const dialog = document.getElementById('keys');
  if (!(dialog instanceof HTMLDialogElement)) return;
  event.preventDefault();
  dialog.showModal();
});

const choice = document.querySelector<HTMLLabelElement>('[data-single-keys]');
const box = choice?.querySelector('input');
if (choice && box) {
  choice.hidden = false;
  box.checked = areSingleKeysOn();
  box.addEventListener('change', () => setSingleKeys(box.checked));
}
