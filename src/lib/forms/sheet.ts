import { z } from 'zod';
import { idField } from './fields';

export const sheetFilter = z.object({ carId: idField('Choose the car (carId).') });
