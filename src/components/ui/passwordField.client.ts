/** Shows and hides what was typed in a password field. Without this the button is not there. */
class PasswordField extends HTMLElement {
  connectedCallback(): void {
    const input = this.querySelector('input');
    const button = this.querySelector('button');
    if (!input || !button) return;
    button.hidden = false;
    button.addEventListener('click', () => {
      const isShown = input.type === 'password';
      input.type = isShown ? 'text' : 'password';
      button.ariaPressed = String(isShown);
      button.textContent = isShown ? 'Hide' : 'Show';
    });
    // Browsers keep what was typed for later in a field of text, not in one of a password.
    input.form?.addEventListener('submit', () => (input.type = 'password'));
  }
}

customElements.define('password-field', PasswordField);
