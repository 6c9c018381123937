import { Injectable, inject } from '@angular/core';
import { patternExamplesSchema, type PatternExamples, type PatternFacts } from '@shared/contract/set-up';
import type { Answer } from '../../../core/answer';
import { ApiClient } from '../../../core/api-client';

/** Asks for worked examples of a pattern that is not saved yet: the server knows the zone's clock changes. */
@Injectable()
export class ExamplesClient {
  private readonly api = inject(ApiClient);

  examples(shedId: string, facts: PatternFacts): Promise<Answer<PatternExamples>> {
    return this.api.post('/api/set-up/patterns/examples', patternExamplesSchema, { shedId, facts });
  }
}
