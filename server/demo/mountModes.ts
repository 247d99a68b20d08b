import type { ModalGain, ModalMode } from '#shared/types/block'

/**
 * The plant of the antenna mount: torques of the two drives to rates of the two gyros at the dish, at three elevations. Invented numbers of the size such
 * a mount has: two rigid bodies, twenty lightly damped modes, nine well damped ones; with two states a mode and one an axis, 60 states.
 */
export const elevations = [10, 45, 80]

/** kg m^2 about the azimuth axis at each elevation, and about the elevation axis */
const azimuthInertia = [1180, 820, 430]
const elevationInertia = 460

/**
 * name, Hz at 45 deg, its change at 10 and at 80 deg, damping ratio, gain in of the azimuth and of the elevation torque (1/sqrt(kg m^2)), and
 * how much of that the gyro of each axis sees, negative where it sits beyond a node
 */
const modes: [string, number, number, number, number, number, number, number, number][] = [
  ['yoke, fore and aft', 11.3, 0.02, -0.03, 0.006, 0.0018, 0.011, 1, 1],
  ['yoke, side to side', 13.8, -0.04, 0.05, 0.0055, 0.0125, 0.0012, 1, 0.9],
  ['dish, first astigmatism', 17.9, 0.01, -0.01, 0.0045, 0.004, 0.0075, 0.9, 1],
  ['train pinion', 21.7, 0, 0, 0.008, 0.014, 0.0008, 1, 1],
  ['elevation screw, axial', 25.4, -0.06, 0.08, 0.007, 0.001, 0.015, 1, 1],
  ['subreflector legs, sway x', 29.6, 0.005, -0.005, 0.004, 0.006, 0.003, -0.7, 0.8],
  ['subreflector legs, sway y', 31.2, -0.005, 0.005, 0.004, 0.0025, 0.0065, 0.8, -0.7],
  ['dish, second astigmatism', 36.5, 0.01, -0.015, 0.005, 0.007, 0.005, 1, -0.8],
  ['pedestal, first bending', 41, -0.015, 0.015, 0.0075, 0.0085, 0.007, 0.8, 0.8],
  ['pedestal, second bending', 44.7, 0.015, -0.015, 0.0075, 0.008, 0.0075, 0.8, -0.6],
  ['counterweight arm', 52.3, -0.03, 0.045, 0.0055, 0.003, 0.0095, 1, 1],
  ['dish, coma', 58.8, 0.01, -0.01, 0.006, 0.0055, 0.006, -0.6, 0.9],
  ['yoke, torsion', 66.1, -0.035, 0.04, 0.0065, 0.01, 0.002, 0.9, 1],
  ['subreflector, rocking', 73.4, 0, 0, 0.0035, 0.004, 0.0045, 0.7, 0.7],
  ['cable wrap', 81.9, -0.01, 0.01, 0.009, 0.0065, 0.001, 1, 0.5],
  ['dish, third astigmatism', 93, 0.008, -0.008, 0.005, 0.005, 0.0055, -0.5, 0.8],
  ['yoke, second bending', 107, -0.02, 0.025, 0.006, 0.006, 0.0065, 0.8, 0.8],
  ['feed boom', 121, 0.012, -0.012, 0.004, 0.0035, 0.004, 0.6, -0.6],
  ['pedestal, shell', 138, 0, 0, 0.007, 0.0055, 0.003, 0.5, 0.5],
  ['dish, rim', 157, -0.006, 0.006, 0.0045, 0.003, 0.004, 0.5, 0.5],
  ['isolators, sway', 2.1, 0, 0, 0.22, 0.003, 0.004, 0.3, 0.3],
  ['isolators, pitch', 3.4, 0.02, -0.02, 0.2, 0.002, 0.008, 0.3, 0.3],
  ['isolators, yaw', 4.3, -0.01, 0.01, 0.24, 0.009, 0.001, 0.3, 0.3],
  ['cabling, azimuth', 6.8, 0, 0, 0.3, 0.005, 0.001, 0.4, 0.4],
  ['cabling, elevation', 7.6, 0, 0, 0.3, 0.001, 0.005, 0.4, 0.4],
  ['gear mesh, azimuth', 176, 0, 0, 0.15, 0.004, 0.0005, 0.6, 0.6],
  ['gear mesh, elevation', 188, 0, 0, 0.15, 0.0005, 0.004, 0.6, 0.6],
  ['motor, azimuth', 210, 0, 0, 0.55, 0.002, 0.0001, 0.5, 0.5],
  ['motor, elevation', 230, 0, 0, 0.55, 0.0001, 0.002, 0.5, 0.5],
]

/** The design model of the plant at the elevation of this index, as a modal table. */
export function mountModes(index: number): ModalGain {
  return {
    kind: 'modal',
    frequencyUnit: 'Hz',
    derivative: 1,
    modes: modes.map(([name, frequency, low, high, damping, azimuthIn, elevationIn, azimuthSeen, elevationSeen]): ModalMode => ({
      name,
      frequency: decimal(frequency * (1 + ([low, 0, high][index] ?? 0))),
      damping,
      gainIn: [azimuthIn, elevationIn],
      gainOut: [decimal(azimuthIn * azimuthSeen), decimal(elevationIn * elevationSeen)],
    })),
    rigid: [
      { power: -1, gainIn: [decimal(1 / (azimuthInertia[index] ?? Number.NaN)), 0], gainOut: [1, 0] },
      { power: -1, gainIn: [0, decimal(1 / elevationInertia)], gainOut: [0, 1] },
    ],
    inputs: ['azTorque', 'elTorque'],
    outputs: ['azRate', 'elRate'],
  }
}

/** Seven digits, as a table has them. */
const decimal = (value: number) => Number(value.toPrecision(7))
