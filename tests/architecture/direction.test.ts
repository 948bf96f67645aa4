import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { arrowsOf, faultOf, mayCall } from './arrows.ts';

const root = fileURLToPath(new URL('../../', import.meta.url));
const sourceFiles = ['server', 'client'].flatMap((folder) =>
  readdirSync(path.join(root, folder), { recursive: true, encoding: 'utf8' })
    .map((file) => path.posix.join(folder, file))
    .filter((file) => /\.tsx?$/.test(file)),
);
const faultsIn = (file: string, source: string) =>
  arrowsOf(file, source)
    .map(faultOf)
    .filter((fault) => fault !== null);

describe('the direction of imports', () => {
  describe.each(Object.keys(mayCall))('from %s', (part) => {
    it('points only where the architecture lets it', () => {
      const files = sourceFiles.filter((file) => file === part || file.startsWith(`${part}/`));
      const faults = files.flatMap((file) =>
        faultsIn(file, readFileSync(path.join(root, file), 'utf8')),
      );
      expect(faults).toEqual([]);
    });
  });

  describe('when an arrow points the wrong way', () => {
    it.each([
      ['server/engine/cycle.ts', "import { now } from '../adapters/clock.ts';"],
      ['server/engine/cycle.ts', "import { readFileSync } from 'node:fs';"],
      ['server/contracts/packs.ts', "import type { Pack } from '../domain/pack.ts';"],
      ['server/contracts/packs.ts', "import express from 'express';"],
      ['server/domain/price.ts', "import { packSchema } from '../contracts/packs.ts';"],
      ['server/domain/price.ts', "import { findPart } from '../store/parts.ts';"],
      ['server/store/parts.ts', "import { placeOrder } from '../use-cases/place-order.ts';"],
      ['server/adapters/smtp-mail.ts', "export * from '../store/parts.ts';"],
      ['server/use-cases/place-order.ts', "import { app } from '../http/app.ts';"],
      ['server/use-cases/place-order.ts', "import Stripe from 'stripe';"],
      ['server/jobs/outbox.ts', "const { db } = await import('../store/connection.ts');"],
      [
        'client/features/brief/model.ts',
        "import { solve } from '../../../server/engine/solve.ts';",
      ],
      [
        'client/features/brief/model.ts',
        "import { PackTag } from '../packs/components/pack-tag.tsx';",
      ],
      ['client/ui/tag.tsx', "import { useBrief } from '../features/brief/use-brief.ts';"],
      ['client/lib/http.ts', "import { readFileSync } from 'node:fs';"],
    ])('is caught in %s: %s', (file, source) => {
      expect(faultsIn(file, source)).toHaveLength(1);
    });
  });

  describe('when an arrow points the right way', () => {
    it.each([
      ['server/domain/price.ts', "import type { Pack } from '../contracts/packs.ts';"],
      ['server/domain/price.ts', "import { type Pack, type Part } from '../contracts/packs.ts';"],
      ['server/contracts/packs.ts', "import { z } from 'zod';"],
      [
        'client/features/brief/model.ts',
        "import { briefSchema } from '../../../server/contracts/brief.ts';",
      ],
      [
        'client/app/routes.tsx',
        "import { PackTag } from '../features/packs/components/pack-tag.tsx';",
      ],
    ])('is let through in %s: %s', (file, source) => {
      expect(faultsIn(file, source)).toEqual([]);
    });
  });
});
