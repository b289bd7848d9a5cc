import { render } from 'lit';
import { describe, expect, it } from 'vitest';
import { withSubscripts } from '#components/symbol-text.ts';

function htmlOf(text: string): string {
  const place = document.createElement('p');
  render(withSubscripts(text), place);
  return place.innerHTML.replaceAll(/<!--.*?-->/g, '');
}

describe('symbols in sentences', () => {
  it.each([
    ['isotropic shielding σ(iso)', 'isotropic shielding σ<sub>iso</sub>'],
    ['σiso 526.67 ppm · V_zz 0.1', 'σ<sub>iso</sub> 526.67 ppm · V<sub>zz</sub> 0.1'],
    ['C_Q = e Q Vzz/h, |C_Q|', 'C<sub>Q</sub> = e Q V<sub>zz</sub>/h, |C<sub>Q</sub>|'],
    ['C_Q(¹⁴N) −0.93 MHz', 'C<sub>Q</sub>(¹⁴N) −0.93 MHz'],
    ['η_Q, C(Q), 2πν_Q/6', 'η<sub>Q</sub>, C<sub>Q</sub>, 2πν<sub>Q</sub>/6'],
    ['|n·σ·n − σ(iso)|', '|n·σ·n − σ<sub>iso</sub>|'],
    ['σ11 ≤ σ22 of Al1', 'σ<sub>11</sub> ≤ σ<sub>22</sub> of Al1'],
  ])('%s', (text, html) => expect(htmlOf(text)).toBe(html));

  it.each(['V1 and V12 at 2/3', 'σ/ppm, V/a.u.', 'Vanadium, C1–Q', 'a_Q, xV_zz', 'σ isotropic', '<b>'])(
    '%s has none',
    (text) => expect(htmlOf(text)).toBe(text.replaceAll('<', '&lt;').replaceAll('>', '&gt;')),
  );
});
