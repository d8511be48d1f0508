import { expect, test } from 'vitest';
import { checkAstroImports, faultsIn } from './astro-imports.mjs';

test('faultsIn() lets a page take a use case and a component', () => {
  const text = "---\nimport { a } from '../server/a.ts';\nimport B from '../components/B.astro';\n---\n<B />";
  expect(faultsIn('src/pages/index.astro', text)).toEqual([]);
});

test('faultsIn() names a component that reaches for the server, and a page that reaches for the worker', () => {
  const component = "---\nimport {\n  a,\n} from '../server/a.ts';\n---";
  expect(faultsIn('src/components/A.astro', component)).toEqual([
    'src/components/A.astro: may not import src/server/a.ts',
  ]);
  const page = "<script>import '../../worker/x.ts';</script>";
  expect(faultsIn('src/pages/a/b.astro', page)).toEqual([
    'src/pages/a/b.astro: may not import src/worker/x.ts',
  ]);
});

test('checkAstroImports() reads every page of the product', () => {
  expect(checkAstroImports().files).toBeGreaterThan(5);
});
