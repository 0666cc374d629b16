/** Carats of one cubic millimetre at SG 1: 1 ct is 0.2 g exactly. */
export const CT_PER_MM3 = 0.005;

export interface CabochonSize { readonly lengthMm: number; readonly widthMm: number; readonly heightMm: number; readonly girdleMm?: number }

/** Volume of a flat-backed cabochon as half an ellipsoid on a girdle band, mm³. All lengths in mm. */
export function cabochonVolumeMm3({ lengthMm, widthMm, heightMm, girdleMm = 0 }: CabochonSize): number {
  return (Math.PI / 6) * lengthMm * widthMm * heightMm + (Math.PI / 4) * lengthMm * widthMm * girdleMm;
}

/** Weight in carats of such a cabochon of specific gravity `sg`. */
export function cabochonWeightCt(size: CabochonSize, sg: number): number {
  return CT_PER_MM3 * sg * cabochonVolumeMm3(size);
}
