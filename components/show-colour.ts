import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { perspectiveLimits } from '#src/scene/camera.ts';
import type { ColourMeaning } from '#src/scene/scene-options.ts';
import type { ColourMapName } from '#src/scene/scene.ts';
import type { Option, ShowContext } from './show-fields.ts';
import { choice, group, numberField, tick } from './show-fields.ts';

/** What colour says, and its limits. */
export function colourGroup(context: ShowContext): TemplateResult {
  const { picture, quantity, set } = context;
  if (!quantity || !picture.showTensors)
    return group(
      'Colour',
      html`<p class="note">Without tensors atoms have the colours of their elements.</p>`,
    );
  return group(
    'Colour',
    html`${choice('colour-by', 'by', picture.colourBy, meanings(context), (colourBy, words) =>
      set({ colourBy, colourLimits: null }, `colour by ${words}`),
    )}
    ${choice(
      'colour-map',
      'map',
      picture.colourMap ?? 'auto',
      [
        { value: 'auto', words: 'as fits the number' },
        { value: 'batlow', words: 'batlow, from dark to light' },
        { value: 'vik', words: 'vik, diverging from zero' },
      ],
      (map, words) =>
        set({ colourMap: map === 'auto' ? null : (map as ColourMapName) }, `colour map ${words}`),
    )}
    ${limitFields(context)}`,
  );
}

function meanings({ quantity, crystal }: ShowContext): Option<ColourMeaning>[] {
  const isEfg = quantity === 'efg';
  const noTrace = isEfg ? 'a field gradient has none' : null;
  const noEfg = crystal.quantities.includes('efg') ? null : 'there are no field gradients';
  const hasSecond = crystal.problems.some(({ code }) => code === 'second-set');
  return [
    { value: 'isotropic', words: isEfg ? 'sign of the lobes' : 'isotropic value' },
    { value: 'span', words: 'span Ω', reason: noTrace },
    { value: 'anisotropy', words: 'anisotropy Δ', reason: noTrace },
    { value: 'asymmetry', words: 'asymmetry η' },
    { value: 'vzz', words: 'largest component Vzz', reason: noEfg },
    { value: 'coupling', words: 'quadrupolar coupling C_Q', reason: noEfg },
    { value: 'residual', words: 'residual against the site symmetry' },
    {
      value: 'difference',
      words: 'difference to a second set',
      reason: hasSecond ? null : 'needs a second set of tensors',
    },
    { value: 'element', words: 'element' },
    { value: 'site', words: 'site' },
  ];
}

/** Automatic, typed, or the present ones kept for other pictures. */
function limitFields({ picture, scene, set }: ShowContext): TemplateResult | typeof nothing {
  const legend = scene?.legend;
  if (!legend) return nothing;
  const [low, high] = picture.colourLimits ?? [legend.low, legend.high];
  const commit = (next: readonly [number, number]): void => {
    if (next[0] < next[1]) set({ colourLimits: next }, 'set the limits of the colour bar');
  };
  const digits = Math.max(legend.digits, 3);
  const shown = (value: number): number => Number(value.toFixed(digits));
  const range = { low: -1e7, high: 1e7 };
  return html`<div class="row">
      ${numberField('low', 'from', '', shown(low), range, (value) => commit([value ?? low, high]))}
      ${numberField('high', 'to', legend.unit, shown(high), range, (value) => commit([low, value ?? high]))}
    </div>
    <div class="row">
      ${
        picture.colourLimits
          ? html`<span class="soft">kept between pictures</span>
              <button class="line" @click=${() => set({ colourLimits: null }, 'automatic limits')}>
                automatic limits
              </button>`
          : html`<span class="soft">automatic</span>
              <button class="line" @click=${() => commit([legend.low, legend.high])}>
                keep these limits
              </button>`
      }
    </div>`;
}

export function labelsGroup({ picture, quantity, set }: ShowContext): TemplateResult {
  return group(
    'Labels',
    html`${choice(
      'labels',
      'beside atoms',
      picture.labels ? picture.labelContent : 'none',
      [
        { value: 'none', words: 'none' },
        { value: 'site', words: 'site' },
        { value: 'element', words: 'element' },
        { value: 'value', words: 'value that colour says', reason: quantity ? null : 'there are no tensors' },
      ],
      (content, words) =>
        set(
          content === 'none' ? { labels: false } : { labels: true, labelContent: content as 'site' },
          `labels: ${words}`,
        ),
    )}`,
  );
}

/** Light and lines. */
export function lookGroup({ look, setLook }: ShowContext): TemplateResult {
  const { perspectiveDegrees: angle } = look;
  return group(
    'Look',
    html`<div class="row">
        ${tick('farther things fade', look.depthCue, (on) => setLook({ depthCue: on }, on ? 'depth cue on' : 'depth cue off'))}
        ${tick('outlines', look.outlines, (on) => setLook({ outlines: on }, on ? 'outlines on' : 'outlines off'))}
        ${tick('principal circles', look.circles, (on) => setLook({ circles: on }, on ? 'circles on' : 'circles off'))}
      </div>
      <div class="row">
        ${tick('perspective', angle > 0, (on) =>
          setLook(
            { perspectiveDegrees: on ? perspectiveLimits.usual : 0 },
            on ? 'perspective on' : 'perspective off',
          ),
        )}
        ${
          angle > 0
            ? numberField(
                'perspective',
                'angle',
                '°',
                angle,
                { low: 1, high: perspectiveLimits.highest },
                (value) => {
                  if (value !== null) setLook({ perspectiveDegrees: value }, `perspective ${value}°`);
                },
              )
            : nothing
        }
      </div>`,
  );
}
