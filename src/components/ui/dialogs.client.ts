/** Opens popover dialogs as modal ones: the page behind stands still and the focus stays inside. */
document.addEventListener('click', (event) => {
  const button = event.target instanceof Element ? event.target.closest('button[popovertarget]') : null;
  const dialog = button && document.getElementById(button.getAttribute('popovertarget') ?? '');
  if (!(dialog instanceof HTMLDialogElement)) return;
  event.preventDefault();
  if (button?.hasAttribute('data-closes')) dialog.close();
  else dialog.showModal();
});
