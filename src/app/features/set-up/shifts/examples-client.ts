import { Injectable, inject } from '@angular/core';
import {
  patternExamplesSchema,
  type patternExamplesRequestSchema,
  type PatternExamples,
} from '@shared/contract/set-up';
import type * as z from 'zod/mini';
import type { Answer } from '../../../core/answer';
import { ApiClient } from '../../../core/api-client';

/** Asks for worked examples of a pattern that is not saved yet: the server knows the zone's clock changes. */
@Injectable()
export class ExamplesClient {
  private readonly api = inject(ApiClient);

  examples(asked: z.infer<typeof patternExamplesRequestSchema>): Promise<Answer<PatternExamples>> {
    return this.api.post('/api/set-up/patterns/examples', patternExamplesSchema, asked);
  }
}
