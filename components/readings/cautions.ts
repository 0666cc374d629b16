import type { Attribute, StoneFlag } from '@shared/api/evidence';

export interface AttributeCaution { title: string; text: string }

/** The usual care before a test, in short; the lab's own rules and a qualified person come first. */
export function cautionFor(attribute: Attribute, flags: readonly StoneFlag[]): AttributeCaution | null {
  if (attribute.startsWith('ri_')) {
    const porous = flags.includes('porous') || flags.includes('coated_or_filled');
    return {
      title: 'Contact liquid',
      text: `${porous ? 'This stone is noted as porous, coated or filled: the liquid can stain it, so leave this test out unless your lab says otherwise. ' : ''}Toxic, and it marks soft stones. Smallest drop, gloves, fresh air, wipe stone and prism, wash hands. Follow your lab’s own rules and ask a qualified person when in doubt.`,
    };
  }
  if (attribute === 'uv_long' || attribute === 'uv_short') {
    return { title: 'Ultraviolet', text: 'Never look at the lamp. Closed cabinet, UV goggles, no hands in short wave. Follow your lab’s own rules.' };
  }
  if (attribute === 'sg' && (flags.includes('porous') || flags.includes('coated_or_filled'))) {
    return { title: 'Water', text: 'This stone is noted as porous, coated or filled: water changes its weight and may harm it. Leave this test out unless your lab says otherwise.' };
  }
  return null;
}
