import { DataTypes } from 'sequelize';

/**
 * Column descriptions. Each is a function because Sequelize writes into the object it is given.
 * The SQL in models/migrations is what makes the tables; these say how values are read and written.
 */
export const text = () => ({ type: DataTypes.TEXT, allowNull: false });
export const textOrNull = () => ({ type: DataTypes.TEXT, allowNull: true });
export const integer = () => ({ type: DataTypes.INTEGER, allowNull: false });
export const integerOrNull = () => ({ type: DataTypes.INTEGER, allowNull: true });
export const real = () => ({ type: DataTypes.DOUBLE, allowNull: false });
export const realOrNull = () => ({ type: DataTypes.DOUBLE, allowNull: true });
export const flag = () => ({ type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false });
export const json = () => ({ type: DataTypes.JSON, allowNull: false });
/** Record ids are kept as text, exactly as the device wrote them. */
export const primaryId = () => ({ type: DataTypes.TEXT, allowNull: false, primaryKey: true });

/** What every synced record has. `revision` is the cursor of its last applied change. */
export const recordColumns = () => ({ id: primaryId(), projectId: text(), deleted: flag(), revision: integer() });

/** Times are ISO 8601 text written by the program, so Sequelize adds none of its own. */
export const tableOptions = (tableName: string) => ({ tableName, underscored: true, timestamps: false, freezeTableName: true }) as const;
