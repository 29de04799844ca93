import { choice, text } from './fields';

export const teamShape = {
  name: text('The team name', 80),
  units: choice(['us', 'metric'], 'Choose the units: us or metric.'),
};
