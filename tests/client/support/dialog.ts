function hideTheRest(dialog: Element, hide: boolean): void {
  for (const each of document.body.children) {
    if (each === dialog) continue;
    if (hide) each.setAttribute('aria-hidden', 'true');
    else each.removeAttribute('aria-hidden');
  }
}

/** jsdom knows the dialog element but cannot open it; this opens it and hides the page around it. */
export function openDialogs(): void {
  HTMLDialogElement.prototype.showModal = function showModal() {
    this.setAttribute('open', '');
    hideTheRest(this, true);
  };
  HTMLDialogElement.prototype.close = function close() {
    this.removeAttribute('open');
    hideTheRest(this, false);
  };
}
