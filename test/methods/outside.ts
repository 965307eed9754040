import type { Bindings } from './use-method.ts'

/** For each limit of validity of a method: inputs laid over its first published case that lie at the limit, and just beyond it. */
export interface Outside {
  /** The limit as the method sheet states it. */
  readonly limit: string
  readonly at: Bindings
  readonly beyond: Bindings
}

export const OUTSIDE: Readonly<Record<string, readonly Outside[]>> = {
  'aisc360-22/e3': [
    // 0.56 sqrt(29000/50) = 13.487 and 1.49 sqrt(29000/50) = 35.884 (AISC 360-22 Table B4.1a)
    { limit: 'lambda_f <= lambda_rf', at: { lambda_f: 13.486 }, beyond: { lambda_f: 13.487 } },
    { limit: 'lambda_w <= lambda_rw', at: { lambda_w: 35.883 }, beyond: { lambda_w: 35.885 } },
    { limit: 'L_cz <= L_cy', at: { L_cz: '30 ft' }, beyond: { L_cz: '30.01 ft' } },
  ],
  'en1993-1-1-2005/6.3.1': [
    { limit: 'A_eff <= A', at: { A_eff: '62.6 cm^2' }, beyond: { A_eff: '62.61 cm^2' } },
    { limit: 'f_y <= 460 MPa', at: { f_y: '460 MPa' }, beyond: { f_y: '460.1 MPa' } },
    { limit: 'gamma_M1 >= 1.0', at: { gamma_M1: 1 }, beyond: { gamma_M1: 0.999 } },
  ],
}
