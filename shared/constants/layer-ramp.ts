/**
 * One hue from pale to deep for the layers in percent, 0 % first. Lightness falls by even steps (CIELAB L* 96, 81, 66, 51,
 * 36, 21), so that equal steps of a layer look equal.
 */
export const LAYER_RAMP = ['#F3F3FB', '#C5C7E9', '#999DCE', '#7076A9', '#4C527D', '#2D314B'] as const;
