import { ChangeDetectionStrategy, Component, computed, input, model } from '@angular/core';
import type { CauseVersion } from '@shared/contract/reference';

/** The causes in force as a list to choose from, in the order in which the mill keeps them. */
@Component({
  selector: 'app-cause-options',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <label class="field">
      Cause
      <select #choice (change)="cause.set(choice.value)">
        @for (group of groups(); track group.name) {
          <optgroup [label]="group.name">
            @for (one of group.causes; track one.causeId) {
              <option [value]="one.causeId" [selected]="one.causeId === cause()">{{ one.name }}</option>
            }
          </optgroup>
        }
      </select>
    </label>
  `,
  styleUrl: './form.scss',
})
export class CauseOptions {
  readonly causes = input.required<readonly CauseVersion[]>();
  readonly cause = model.required<string>();

  protected readonly groups = computed(() => {
    const groups = new Map<string, CauseVersion[]>();
    for (const cause of this.causes()) groups.set(cause.group, [...(groups.get(cause.group) ?? []), cause]);
    return [...groups].map(([name, causes]) => ({ name: GROUP_WORDS[name] ?? name, causes }));
  });
}

const GROUP_WORDS: Readonly<Record<string, string>> = {
  warp: 'Warp',
  weft: 'Weft',
  loom: 'Loom, for the tackler',
  waiting: 'Waiting',
  'warp-change': 'Warp change',
  care: 'Cut, clean, check',
  shed: 'Shed stop',
  planned: 'Planned',
};
