/**
 * Stands in for the maths field in jsdom, which lacks the layout that the real one needs: a text field with its
 * interface. The real one is tested in the browser.
 */
export class MathfieldElement extends HTMLElement {
  static fontsDirectory: string | null = null;
  static soundsDirectory: string | null = null;
  static plonkSound: string | null = null;
  static keypressSound: string | null = null;
  static keypressVibration = false;

  menuItems: unknown[] = [];
  inlineShortcuts: Record<string, unknown> = {};
  mode = 'math';
  readOnly = false;
  private tex = '';

  connectedCallback(): void {
    this.tabIndex = 0;
    if (!this.hasAttribute('role')) this.setAttribute('role', 'textbox');
  }

  get value(): string {
    return this.tex;
  }

  set value(tex: string) {
    this.tex = tex;
    this.textContent = tex;
  }

  getValue(): string {
    return this.tex;
  }

  setValue(tex: string, options?: { silenceNotifications?: boolean }): void {
    this.value = tex;
    if (!options?.silenceNotifications) this.dispatchEvent(new InputEvent('input', { bubbles: true }));
  }

  insert(tex: string): boolean {
    this.setValue(this.tex + tex);
    return true;
  }

  executeCommand(): boolean {
    return true;
  }

  hasFocus(): boolean {
    return document.activeElement === this;
  }
}

customElements.define('math-field', MathfieldElement);

Object.assign(window, {
  mathVirtualKeyboard: Object.assign(new EventTarget(), {
    layouts: [],
    editToolbar: 'none',
    visible: false,
    boundingRect: { height: 0 },
    show: () => undefined,
    hide: () => undefined,
  }),
});
