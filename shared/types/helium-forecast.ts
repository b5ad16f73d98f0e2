/** Stock of liquid helium in the storage dewars at one instant, litres. */
export interface StockPoint { at: string, litres: number }

/** The same with its 80 % band, for what is still to come. */
export interface StockBandPoint extends StockPoint { low: number, high: number }

/** A forecast of one kind, with when it falls under the reserve. */
export interface StockForecast<Point extends StockPoint = StockPoint> {
  points: Point[]
  /** First instant under the reserve: likely, and at the low end of the band. */
  likelyShortAt: string | null
  lowShortAt: string | null
  sentence: string
}

/** The helium strip: what was, what is, and what is to come. */
export interface HeliumForecastReply {
  timeZone: string
  reserveLitres: number
  history: StockPoint[]
  /** The likely stock with the runs that hold their days, for people without a facility role; empty where `detail` has it. */
  line: StockPoint[]
  /** For people with a facility role. */
  detail: {
    onHandLitres: number
    held: StockForecast<StockBandPoint>
    /** As if every asked run went as well. */
    allAsked: StockForecast
    askedCount: number
    deliveries: { dueAt: string, litres: number, isOverdue: boolean }[]
  } | null
}
