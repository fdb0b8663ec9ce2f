import { Sequelize } from 'sequelize'
import { initModels } from '../models/index.ts'

/** Opens a pool of connections and binds the models to it. Connects at the first query. */
export function openDatabase(url: string, pool: number): Sequelize {
  const database = new Sequelize(url, {
    dialect: 'postgres',
    logging: false,
    define: { underscored: true, timestamps: false },
    pool: { max: pool, min: 0, idle: 10_000, acquire: 5_000 },
    dialectOptions: { connectionTimeoutMillis: 4_000, keepAlive: true, application_name: 'bayloom' },
  })
  initModels(database)
  return database
}
