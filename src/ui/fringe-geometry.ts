/** The geometry is the contract's, since screen and print must draw the same mark. */
export { fringeHalves, type Fringe, type FringeHalf } from '../../server/contract/fringe-geometry.ts'
