import { Injectable, inject } from '@angular/core';
import { AccessToken } from '../../core/access-token';

/** Fetches a shift's sheet as a PDF with the bearer, and hands it to the browser to save. */
@Injectable({ providedIn: 'root' })
export class SheetPdfClient {
  private readonly token = inject(AccessToken);

  /** Whether it was saved; false: the server was not reached, or did not give it. */
  async save(shiftKey: string): Promise<boolean> {
    const pdf = await this.fetch(`/api/reports/shifts/${encodeURIComponent(shiftKey)}/sheet.pdf`);
    if (!pdf) return false;
    const url = URL.createObjectURL(pdf);
    const link = document.createElement('a');
    link.href = url;
    link.download = `shift-${shiftKey.replace(/[^A-Za-z0-9-]+/g, '-')}.pdf`;
    link.click();
    // The browser has begun to read it by then.
    setTimeout(() => URL.revokeObjectURL(url), 60_000);
    return true;
  }

  private async fetch(path: string): Promise<Blob | null> {
    try {
      let response = await this.ask(path);
      if (response.status === 401 && (await this.token.renew())) response = await this.ask(path);
      const isPdf = response.headers.get('content-type')?.startsWith('application/pdf') === true;
      return response.ok && isPdf ? await response.blob() : null;
    } catch {
      return null;
    }
  }

  private ask(path: string): Promise<Response> {
    return globalThis.fetch(path, { headers: { Authorization: `Bearer ${this.token.value ?? ''}` } });
  }
}
