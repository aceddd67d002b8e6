import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { presentToday } from '../desk/present-today'
import { serve } from './serve'

export function todayRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.today, () => presentToday(context))
}
