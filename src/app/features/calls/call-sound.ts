import { Injectable, signal } from '@angular/core';

const KEPT_AS = 'shedbeat-calls-muted';
/** Two tones, three times: told apart from a loom's own noise by its rhythm. Hz, s. */
const TONES = [880, 1_320] as const;
const TONE = 0.16;
const ROUNDS = 3;

/** The sound of a call, made on the device. Whether it is muted is this device's own setting. */
@Injectable({ providedIn: 'root' })
export class CallSound {
  private readonly mutedNow = signal(readMuted());
  private context: AudioContext | null = null;

  readonly muted = this.mutedNow.asReadonly();

  mute(muted: boolean): void {
    this.mutedNow.set(muted);
    try {
      globalThis.localStorage.setItem(KEPT_AS, muted ? 'yes' : 'no');
    } catch {
      // A browser that keeps no settings forgets this one at the next start.
    }
    if (!muted) this.ring();
  }

  /** Browsers let a page sound only after somebody has touched it: until then this is silent. */
  ring(): void {
    if (this.mutedNow() || typeof AudioContext === 'undefined') return;
    try {
      const context = (this.context ??= new AudioContext());
      void context
        .resume()
        .then(() => play(context))
        .catch(() => undefined);
    } catch {
      // No sound device: vibration and flash are left.
    }
  }
}

function play(context: AudioContext): void {
  const volume = context.createGain();
  volume.gain.value = 0.5;
  volume.connect(context.destination);
  for (let round = 0; round < ROUNDS; round += 1)
    TONES.forEach((frequency, i) => {
      const tone = context.createOscillator();
      tone.type = 'square';
      tone.frequency.value = frequency;
      tone.connect(volume);
      const begin = context.currentTime + (round * (TONES.length + 1) + i) * TONE;
      tone.start(begin);
      tone.stop(begin + TONE);
    });
}

function readMuted(): boolean {
  try {
    return globalThis.localStorage.getItem(KEPT_AS) === 'yes';
  } catch {
    return false;
  }
}
