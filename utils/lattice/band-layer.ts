import type { EdgeLayer, FragmentLayer } from 'sigma/rendering'
import { channelsOf } from './tokens'
import type { Tokens } from './tokens'

const FLOAT = 5126
const UNSIGNED_BYTE = 5121

const vec3 = (colour: string): [number, number, number] => {
  const [r, g, b] = channelsOf(colour)
  return [r / 255, g / 255, b / 255]
}

/** Per-edge numbers of the band layer, all read from edge attributes of the same name. */
const EDGE_VARIABLES = ['kind', 'from', 'span', 'value', 'inlay', 'casing', 'outline', 'caps'] as const

export type EdgeVariable = (typeof EDGE_VARIABLES)[number]

/**
 * One layer draws every straight thing that carries meaning: chain bands with casing, focus outline and inlay; load
 * tubes filled up to `value`; dashed breaks; plain lines. Widths inside the shader are in pixels, so that casings and
 * outlines keep theirs at every zoom. `from` and `span` place the edge on its line of the lattice: dots of an inlay
 * then sit between crossings. Only the chain in focus is drawn by it, which passes over all others.
 */
export function bandLayer(tokens: Tokens): EdgeLayer {
  return {
    name: 'band',
    uniforms: (['paper', 'ink', 'edge'] as const).map((name) => ({
      name: `u_${name}`,
      type: 'vec3' as const,
      value: vec3(tokens[name]),
    })),
    attributes: EDGE_VARIABLES.map((name) => ({ name, size: 1 as const, type: FLOAT, source: name })),
    glsl: BAND_GLSL,
  }
}

const BAND_GLSL = /* glsl */ `
float covered(float d) { return clamp(0.5 - d, 0.0, 1.0); }

vec3 tubeColour(float d, float casing, float along, float side, float unit) {
  float wall = v_outline > 0.5 ? 1.5 : 1.0;
  vec3 wallColour = v_outline > 0.5 || v_inlay > 2.5 ? u_ink : u_edge;
  float filled = covered((along - v_value) * unit);
  vec3 fill = v_color.rgb;
  if (v_inlay > 2.5) fill = mix(u_paper, fill, covered(1.35 - abs(mod(along * unit + side, 5.0) - 2.5)));
  vec3 inside = mix(u_paper, fill, filled);
  inside = mix(inside, u_ink, covered(abs((along - v_value) * unit) - 0.6));
  vec3 colour = mix(u_paper, wallColour, covered(d + casing));
  return mix(colour, inside, covered(d + casing + wall));
}

vec3 bandColour(float d, float casing, float total, float across, float ends, float along, float unit, float radius) {
  float outline = v_outline * min(1.6, 0.15 * total);
  float gap = v_outline * min(1.4, 0.11 * total);
  vec3 colour = u_paper;
  if (v_outline > 0.5) {
    colour = mix(colour, u_ink, covered(d + casing));
    colour = mix(colour, u_paper, covered(d + casing + outline));
  }
  colour = mix(colour, v_color.rgb, covered(d + casing + outline + gap));
  float inner = radius - casing - outline - gap;
  float strength = smoothstep(0.8, 1.8, inner);
  if (v_inlay > 0.5 && v_inlay < 1.5) {
    float inlay = length(vec2(max(ends + 0.6 * radius, 0.0), across)) - max(0.5, 0.3 * inner);
    colour = mix(colour, u_paper, strength * covered(inlay));
  } else if (v_inlay > 1.5) {
    float pace = exp2(ceil(log2(max(1.0, 8.0 / unit))));
    float inlay = length(vec2(abs(fract(along / pace) - 0.5) * pace * unit, across)) - max(0.6, 0.4 * inner);
    colour = mix(colour, u_paper, strength * covered(inlay) * covered(ends + 0.6));
  }
  return colour;
}

vec4 layer_band(EdgeContext ctx) {
  // sigma's own unit is half a pixel.
  float px = 2.0 * ctx.aaWidth;
  float total = ctx.thickness / px;
  float radius = 0.5 * total - 0.5;
  float across = ctx.sdf / px + 0.5 * total;
  float fromSource = ctx.distanceFromSource / px;
  float toTarget = ctx.distanceToTarget / px;
  float unit = ctx.edgeLength / px / max(v_span, 0.001);
  float along = v_from + ctx.t * v_span;
  float ends = v_caps > 0.5 ? max(radius - fromSource, radius - toTarget) : -1000.0;
  float d = length(vec2(max(ends, 0.0), across)) - radius;
  float casing = v_casing * min(1.0, 0.16 * total);

  vec3 colour = v_color.rgb;
  if (v_kind > 2.5) {
    float period = clamp(1.3 * total, 6.0, 11.0);
    float dash = covered(abs(mod(fromSource, period) - 0.29 * period) - 0.29 * period);
    colour = mix(u_paper, colour, dash * covered(d + casing));
  } else if (v_kind > 1.5) {
    colour = tubeColour(d, casing, along, sign(v_side) * across, unit);
  } else if (v_kind > 0.5) {
    colour = bandColour(d, casing, total, across, ends, along, unit, radius);
  }
  return vec4(colour, covered(d) * v_color.a);
}
`

const literal = (colour: string) =>
  `vec3(${vec3(colour)
    .map((v) => v.toFixed(5))
    .join(', ')})`

/** Fill, rim and a casing of paper around squares, rings and glyphs. */
export function glyphLayer(tokens: Tokens): FragmentLayer {
  return {
    name: 'glyph',
    uniforms: [],
    attributes: [
      { name: 'fillColour', size: 4, type: UNSIGNED_BYTE, normalized: true, source: 'color' },
      { name: 'rimColour', size: 4, type: UNSIGNED_BYTE, normalized: true, source: 'rim' },
      { name: 'rimWidth', size: 1, type: FLOAT, source: 'rimWidth' },
      { name: 'halo', size: 1, type: FLOAT, source: 'halo' },
    ],
    glsl: /* glsl */ `
vec4 layer_glyph(vec4 v_fillColour, vec4 v_rimColour, float v_rimWidth, float v_halo) {
  float d = context.sdf / context.pixelToUV;
  vec3 colour = mix(${literal(tokens.paper)}, v_rimColour.rgb, clamp(0.5 - d - v_halo, 0.0, 1.0));
  colour = mix(colour, v_fillColour.rgb, clamp(0.5 - d - v_halo - v_rimWidth, 0.0, 1.0));
  return vec4(colour, 1.0);
}
`,
  }
}
