import { existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';

export interface CaughtMail {
  id: string;
  from: string;
  to: string[];
  subject: string;
  text: string;
  html: string | null;
  /** RFC 3339, UTC. */
  receivedAt: string;
  /** File names. */
  attachments: string[];
}

interface KeptMail {
  mail: CaughtMail;
  source: string;
}

/** The caught mails, newest last; kept as files too when there is a folder for them. */
export class MailBox {
  #kept: KeptMail[] = [];

  constructor(
    private readonly folder: string | null,
    private readonly capacity: number,
  ) {
    if (folder === null) return;
    mkdirSync(folder, { recursive: true });
    this.#kept = idsIn(folder).map((id) => readKept(folder, id));
  }

  /** Newest first. */
  list(): CaughtMail[] {
    return this.#kept.map(({ mail }) => mail).reverse();
  }

  find(id: string): KeptMail | null {
    return this.#kept.find(({ mail }) => mail.id === id) ?? null;
  }

  add(mail: CaughtMail, source: string): void {
    this.#kept.push({ mail, source });
    if (this.folder !== null) {
      writeFileSync(path.join(this.folder, `${mail.id}.eml`), source, { mode: 0o600 });
      writeFileSync(path.join(this.folder, `${mail.id}.json`), JSON.stringify(mail), {
        mode: 0o600,
      });
    }
    while (this.#kept.length > this.capacity) this.#drop(this.#kept[0]);
  }

  clear(): void {
    for (const kept of [...this.#kept]) this.#drop(kept);
  }

  #drop(kept: KeptMail | undefined): void {
    if (!kept) return;
    this.#kept = this.#kept.filter((other) => other !== kept);
    if (this.folder === null) return;
    rmSync(path.join(this.folder, `${kept.mail.id}.eml`), { force: true });
    rmSync(path.join(this.folder, `${kept.mail.id}.json`), { force: true });
  }
}

function idsIn(folder: string): string[] {
  return readdirSync(folder)
    .filter((name) => name.endsWith('.json'))
    .map((name) => name.slice(0, -'.json'.length))
    .sort();
}

function readKept(folder: string, id: string): KeptMail {
  const mail = JSON.parse(readFileSync(path.join(folder, `${id}.json`), 'utf8')) as CaughtMail;
  const file = path.join(folder, `${id}.eml`);
  return { mail, source: existsSync(file) ? readFileSync(file, 'utf8') : '' };
}
