import { Directive, ElementRef, inject, output } from '@angular/core';

/** So far a finger goes sideways before it means the next loom, px; and so much further than up or down. */
const FAR = 48;
const STEEPNESS = 1.5;

/**
 * A finger that goes sideways over the one loom of a phone: 1 to the next, −1 to the one before. A button under it
 * is not pressed: its click is swallowed. Nothing is done by a swipe alone; the chips above do the same.
 */
@Directive({
  selector: '[appSwipe]',
  host: {
    '(pointerdown)': 'begin($event)',
    '(pointerup)': 'end($event)',
    '(pointercancel)': 'start = null',
  },
})
export class Swipe {
  readonly appSwipe = output<1 | -1>();

  protected start: { readonly id: number; readonly x: number; readonly y: number } | null = null;
  private swiped = false;

  constructor() {
    // Before any button of the card hears of it.
    inject<ElementRef<HTMLElement>>(ElementRef).nativeElement.addEventListener(
      'click',
      (event) => {
        if (!this.swiped) return;
        this.swiped = false;
        event.stopPropagation();
        event.preventDefault();
      },
      true,
    );
  }

  protected begin(event: PointerEvent): void {
    this.swiped = false;
    this.start =
      event.isPrimary && event.pointerType !== 'mouse'
        ? { id: event.pointerId, x: event.clientX, y: event.clientY }
        : null;
  }

  protected end(event: PointerEvent): void {
    const { start } = this;
    this.start = null;
    if (start?.id !== event.pointerId) return;
    const [right, down] = [event.clientX - start.x, event.clientY - start.y];
    if (Math.abs(right) < FAR || Math.abs(right) < STEEPNESS * Math.abs(down)) return;
    this.swiped = true;
    this.appSwipe.emit(right < 0 ? 1 : -1);
  }
}
