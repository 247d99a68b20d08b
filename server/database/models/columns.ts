import { DataTypes, type Model } from 'sequelize'

/** The kinds of column our STRICT tables have, a new object each time since Sequelize writes into it. Times are ISO 8601 text in UTC. */
export const id = () => ({ type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true, allowNull: false }) as const
export const text = () => ({ type: DataTypes.TEXT, allowNull: false }) as const
export const textOrNull = () => ({ type: DataTypes.TEXT, allowNull: true }) as const
export const whole = () => ({ type: DataTypes.INTEGER, allowNull: false }) as const
export const wholeOrNull = () => ({ type: DataTypes.INTEGER, allowNull: true }) as const
export const real = () => ({ type: DataTypes.DOUBLE, allowNull: false }) as const
export const realOrNull = () => ({ type: DataTypes.DOUBLE, allowNull: true }) as const
export const bytes = () => ({ type: DataTypes.BLOB, allowNull: false }) as const

/** A yes or no, stored as 1 or 0: a STRICT table has no boolean the driver would recognise. */
export const flag = (name: string) => ({
  type: DataTypes.BOOLEAN,
  allowNull: false,
  get(this: Model): boolean {
    return Boolean(this.getDataValue(name))
  },
})

/** Plain data stored as JSON text. */
export const json = <Value>(name: string) => ({
  type: DataTypes.TEXT,
  allowNull: false,
  get(this: Model): Value | undefined {
    const stored: unknown = this.getDataValue(name)
    return stored === undefined ? undefined : JSON.parse(stored as string) as Value
  },
  set(this: Model, value: Value): void {
    this.setDataValue(name, JSON.stringify(value))
  },
})

/** The same where there may be none. */
export const jsonOrNull = <Value>(name: string) => ({
  type: DataTypes.TEXT,
  allowNull: true,
  get(this: Model): Value | null | undefined {
    const stored: unknown = this.getDataValue(name)
    return typeof stored === 'string' ? JSON.parse(stored) as Value : stored as null | undefined
  },
  set(this: Model, value: Value | null): void {
    this.setDataValue(name, value === null ? null : JSON.stringify(value))
  },
})

/** What rows with a soft delete are read with; `unscoped()` sees the deleted ones too. */
export const liveRows = { where: { deletedAt: null } }
