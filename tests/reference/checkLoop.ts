import loops from './loops.json'

/** A textbook loop with its computed values, its source and what was printed there; a printed value that differs is no target. */
export interface CheckLoop {
  id: string
  title: string
  /** the loop in words of its source */
  loop: string
  num: number[]
  den: number[]
  delay: number
  Ts: number | null
  expected: {
    /** [rad/s, deg] */
    gain_crossovers: [number, number][]
    /** [rad/s, s] */
    delay_margins_s: [number, number][]
    /** [rad/s, dB] */
    phase_crossovers: [number, number][]
    /** true where a dead time makes more crossings than are listed */
    phase_crossovers_truncated: boolean
    dc: { L0: number, gm_db?: number } | null
    infinity: { Linf: number, gm_db?: number } | null
    /** [rad/s or 'inf', ratio] */
    vector_margin: [number | 'inf', number]
    Ms: number | 'inf'
    /** [rad/s or 'inf', ratio] */
    Mt: [number | 'inf', number] | null
    closed_loop_stable: boolean
    closed_loop_unstable_poles: number
    open_loop_rhp_poles: number
    open_loop_boundary_poles: number
    marginal?: boolean
    /** rad/s, or in z */
    closed_loop_poles?: [number, number][]
  }
  source: string
  confirmation: string
}

export const checkLoops = loops as unknown as CheckLoop[]
