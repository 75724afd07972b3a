// A page is drawn before it hears. What is pressed or typed meanwhile is held, and done once its part of the page is awake:
// an island of Astro's bears `ssr` until then, an element of our own is not defined. It runs before anything is drawn.
(() => {
  const OWN_ELEMENTS = ['json-form', 'print-button', 'dusk-switch'];
  const ASLEEP = ['astro-island[ssr]', ...OWN_ELEMENTS.map((name) => `${name}:not(:defined)`)].join();
  const PRESSED = 'button, input, [role=button], [role=tab], [role=option]';
  const TICKED = /^(checkbox|radio)$/;
  /** How long a press waits before the person is told of it, ms. */
  const PATIENCE_MS = 4000;

  /** Presses in their order: what was pressed, the part of the page it waits for, and what to do then. */
  let presses = [];
  /** What was typed: field → the part of the page it waits for, and the value. */
  const typed = new Map();
  let timer = 0;

  const asleepAround = (element) => element?.closest?.(ASLEEP) ?? null;
  const isAwake = (part) => !asleepAround(part);

  const sayLoading = () => {
    const words = document.createElement('p');
    words.setAttribute('role', 'status');
    words.dataset.heldNote = '';
    const again = document.createElement('a');
    again.href = '';
    again.className = 'link';
    again.textContent = 'load the page again';
    words.append(
      'The page is still loading. What you pressed is kept and will be done. If it takes long, look to your connection and ',
      again,
      '.',
    );
    document.body.append(words);
  };

  const hold = (control, part, act) => {
    // A box pressed twice is ticked and unticked; a button pressed twice is meant once.
    if (!TICKED.test(control.type) && presses.some((one) => one.control === control)) return;
    presses.push({ control, part, act });
    control.setAttribute('data-held', '');
    part.setAttribute('aria-busy', 'true');
    timer ||= setTimeout(sayLoading, PATIENCE_MS);
  };

  /** Tells an island of what was typed, as if it was typed now; React hears of a value only when it differs from the last. */
  const retell = (field, value) => {
    // React wakes at once whatever a press falls on; this one means nothing to anybody.
    field.dispatchEvent(new Event('auxclick', { bubbles: true }));
    const { set } = Object.getOwnPropertyDescriptor(Object.getPrototypeOf(field), 'value');
    const isSelect = field.tagName === 'SELECT';
    if (!isSelect) field.value = value === field.defaultValue ? '' : field.defaultValue;
    set.call(field, value);
    field.dispatchEvent(new Event(isSelect ? 'change' : 'input', { bubbles: true }));
  };

  const wake = () => {
    for (const [field, { part, value }] of typed) {
      if (!isAwake(part)) continue;
      typed.delete(field);
      if (field.isConnected) retell(field, value);
    }
    const ready = presses.filter(({ part }) => isAwake(part));
    if (ready.length === 0) return;
    presses = presses.filter((one) => !ready.includes(one));
    for (const { control, part } of ready) {
      control.removeAttribute('data-held');
      part.removeAttribute('aria-busy');
    }
    if (presses.length === 0) {
      clearTimeout(timer);
      timer = 0;
      document.querySelector('[data-held-note]')?.remove();
    }
    for (const { control, act } of ready) if (control.isConnected) act();
  };
  const wakeSoon = () => setTimeout(wake);

  addEventListener(
    'click',
    (event) => {
      const control = event.target.closest?.(PRESSED);
      const part = asleepAround(control);
      if (!part || !event.isTrusted || control.closest('a[href]')) return;
      const isField = control.tagName === 'INPUT' && !TICKED.test(control.type);
      if (isField && !/^(submit|image|reset|button|file)$/.test(control.type)) return;
      event.preventDefault();
      event.stopImmediatePropagation();
      hold(control, part, () => control.click());
    },
    true,
  );
  addEventListener(
    'submit',
    (event) => {
      const part = asleepAround(event.target);
      if (!part) return;
      event.preventDefault();
      event.stopImmediatePropagation();
      hold(event.target, part, () => event.target.requestSubmit());
    },
    true,
  );
  const noteTyped = ({ target: field }) => {
    const part = asleepAround(field);
    // Our own elements read their fields when they are sent.
    if (!part?.matches('astro-island') || !/^(INPUT|SELECT|TEXTAREA)$/.test(field.tagName)) return;
    if (TICKED.test(field.type) || field.type === 'file') return;
    typed.set(field, { part, value: field.value });
  };
  addEventListener('input', noteTyped, true);
  addEventListener('change', noteTyped, true);

  new MutationObserver(wakeSoon).observe(document, { subtree: true, attributeFilter: ['ssr'] });
  for (const name of OWN_ELEMENTS) customElements.whenDefined(name).then(wakeSoon);
})();
