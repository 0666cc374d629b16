/**
 * Optic axial angle measured about the Z axis (gamma), in degrees, exact from three principal indices:
 * tan²Vz = (1/α² − 1/β²) / (1/β² − 1/γ²). Below 90° the stone is biaxial positive, above it negative.
 * @throws RangeError unless 1 ≤ α ≤ β ≤ γ with α < γ
 * @example axialAngle2VzDeg(1.740779, 1.74273, 1.74836) // 61.13
 */
export function axialAngle2VzDeg(alpha: number, beta: number, gamma: number): number {
  if (!(alpha >= 1 && alpha <= beta && beta <= gamma && alpha < gamma)) {
    throw new RangeError('indices must satisfy 1 ≤ alpha ≤ beta ≤ gamma');
  }
  const lower = alpha ** -2 - beta ** -2;
  const upper = beta ** -2 - gamma ** -2;
  return (2 * Math.atan2(Math.sqrt(lower), Math.sqrt(upper)) * 180) / Math.PI;
}
