import { type ApiRouter, mount } from '#api/http/route.ts'
import {
  contrastColors,
  convertColor,
  mixColor,
  nearestColor,
  rampColor,
  simulateColor,
} from '#shared/contracts/colors.contract.ts'
import {
  answerContrast,
  answerConversion,
  answerMix,
  answerNearest,
  answerRamp,
  answerSimulation,
} from './colors.service.ts'

/** Arithmetic on what is sent: nothing is read and nothing is stored. */
export function mountColors(router: ApiRouter): void {
  mount(router, convertColor, ({ body }) => ({ body: answerConversion(body) }))
  mount(router, contrastColors, ({ body }) => ({ body: answerContrast(body) }))
  mount(router, mixColor, ({ body }) => ({ body: answerMix(body) }))
  mount(router, rampColor, ({ body }) => ({ body: answerRamp(body) }))
  mount(router, simulateColor, ({ body }) => ({ body: answerSimulation(body) }))
  mount(router, nearestColor, ({ body }) => ({ body: answerNearest(body) }))
}
