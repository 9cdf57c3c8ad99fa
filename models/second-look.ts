import type { Sequelize } from 'sequelize';
import { realOrNull, recordColumns, tableOptions, text, textOrNull } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `second_looks`; fields as in the `secondLook` schema. */
export function defineSecondLook(sequelize: Sequelize): SyncedModel<'secondLook'> {
  return sequelize.define<SyncedInstance<'secondLook'>>(
    'SecondLook',
    {
      ...recordColumns(),
      visitId: text(),
      measurementId: text(),
      readingId: textOrNull(),
      rule: text(),
      moment: text(),
      level: text(),
      quantity: text(),
      enteredDigits: textOrNull(),
      enteredCanonical: realOrNull(),
      expectedLow: realOrNull(),
      expectedHigh: realOrNull(),
      tailProbability: realOrNull(),
      cause: textOrNull(),
      causeProbability: realOrNull(),
      suggestedQuantity: textOrNull(),
      suggestedDigits: textOrNull(),
      raisedBy: text(),
      raisedAt: text(),
      answer: text(),
      reason: textOrNull(),
      answerNote: text(),
      answeredById: textOrNull(),
      answeredAt: textOrNull(),
      answerReadingId: textOrNull(),
    },
    tableOptions('second_looks'),
  );
}
