import type { Problem } from '@/api-types/problem';

/** Sends the form inside it as JSON; says in words what went wrong; goes on when it went well. */
class JsonForm extends HTMLElement {
  private busy = false;

  connectedCallback() {
    this.form.addEventListener('submit', (event) => {
      event.preventDefault();
      if (!this.busy) void this.send();
    });
  }

  private get form(): HTMLFormElement {
    return this.querySelector('form')!;
  }

  private say(text: string) {
    this.querySelector('[data-problem]')!.textContent = text;
  }

  /** In another tab, so that what is typed here stays. */
  private offerSignIn() {
    const link = document.createElement('a');
    link.href = '/sign-in';
    link.target = '_blank';
    link.className = 'link';
    link.textContent = 'Sign in';
    this.querySelector('[data-problem]')!.append(' ', link);
  }

  private clear() {
    this.say('');
    for (const field of this.form.querySelectorAll('[aria-invalid]'))
      field.removeAttribute('aria-invalid');
    for (const note of this.form.querySelectorAll<HTMLElement>('[data-note-for]')) {
      note.textContent = note.dataset.hint ??= note.textContent ?? '';
      note.classList.remove('text-brick');
    }
  }

  private body(): Record<string, unknown> {
    const body: Record<string, unknown> = {};
    for (const [name, value] of new FormData(this.form)) body[name] = value;
    for (const box of this.form.querySelectorAll<HTMLInputElement>('input[type=checkbox][name]'))
      body[box.name] = box.checked;
    const pressed = this.form.dataset.pressed;
    return pressed ? { ...body, ...JSON.parse(pressed) } : body;
  }

  private async send() {
    this.clear();
    this.busy = true;
    this.form.setAttribute('aria-busy', 'true');
    try {
      const response = await fetch(this.dataset.action!, {
        method: this.dataset.method,
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify(this.body()),
      });
      const answer = await response.json().catch(() => null);
      if (response.ok) this.goOn(answer?.id);
      else this.refuse(answer);
      if (response.status === 401 && this.dataset.action !== '/api/sign-in') this.offerSignIn();
    } catch {
      this.say('The server could not be reached. What you typed is still here; try again.');
    } finally {
      this.busy = false;
      this.form.removeAttribute('aria-busy');
    }
  }

  private goOn(id: string | undefined) {
    const then = this.dataset.then!;
    if (then === 'reload') location.reload();
    else location.assign(then.replace('{id}', id ?? ''));
  }

  private refuse(problem: Problem | null) {
    let unplaced = problem?.errors ? '' : (problem?.detail ?? 'That did not work. Try again.');
    let first: HTMLElement | null = null;
    for (const error of problem?.errors ?? []) {
      const name = String(error.path[0] ?? '');
      const field = this.form.elements.namedItem(name);
      const note = this.form.querySelector<HTMLElement>(`[data-note-for="${name}"]`);
      if (field instanceof HTMLElement && note) {
        field.setAttribute('aria-invalid', 'true');
        note.textContent = error.message;
        note.classList.add('text-brick');
        first ??= field;
      } else unplaced ||= error.message;
    }
    this.say(unplaced);
    first?.focus();
  }
}

customElements.define('json-form', JsonForm);
