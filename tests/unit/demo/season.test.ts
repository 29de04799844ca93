import { DateTime, IANAZone } from 'luxon';
import { describe, expect, it } from 'vitest';
import { DEMO_PASSWORD, demoPassRows, generateDemoSeason } from '@/demo';
import { conditionsFromReading } from '@/lib/domain/air/conditions';
import { suggestFor } from '@/lib/domain/model';
import { ROLES } from '@/lib/domain/permissions';
import { LANES } from '@/lib/domain/types';
import { toPassRecord } from '@/lib/pass-csv';

const season = generateDemoSeason();
const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length;
const refs = (items: readonly { ref: string }[]): Set<string> => new Set(items.map(({ ref }) => ref));
const roundOf = (ref: string) => season.rounds.find((round) => round.ref === ref)!;
const eventOf = (ref: string) => season.events.find((event) => event.ref === ref)!;
const trackOf = (ref: string) => season.tracks.find((track) => track.ref === ref)!;
const readingOf = (ref: string) => season.readings.find((reading) => reading.ref === ref)!;

describe('the demo season', () => {
  it('is the same for the same seed, and another for another', () => {
    expect(generateDemoSeason()).toEqual(season);
    expect(generateDemoSeason(1).passes).not.toEqual(season.passes);
  });

  it.each([1, 2, 3, 4, 5])('has at least 130 passes over a dozen events whatever the seed (%i)', (seed) => {
    const { passes, events } = generateDemoSeason(seed);
    expect(passes.length).toBeGreaterThanOrEqual(130);
    expect(events.length).toBeGreaterThanOrEqual(12);
    expect(passes.map(({ passNo }) => passNo)).toEqual(passes.map((_, index) => index + 1));
  });

  it('names nothing that is not in it, and nothing twice', () => {
    const { tracks, events, rounds, readings, passes, discSets } = season;
    for (const items of [tracks, events, rounds, readings, passes, discSets])
      expect(refs(items).size).toBe(items.length);
    for (const event of events) expect(refs(tracks)).toContain(event.trackRef);
    for (const round of rounds) expect(refs(events)).toContain(round.eventRef);
    for (const reading of readings) {
      expect(refs(rounds)).toContain(reading.roundRef);
      expect(eventOf(roundOf(reading.roundRef).eventRef).trackRef).toBe(reading.trackRef);
    }
    for (const pass of passes) {
      expect(refs(discSets)).toContain(pass.discSetRef);
      expect(readingOf(pass.readingRef).roundRef).toBe(pass.roundRef);
    }
    expect(new Set(passes.map(({ roundRef }) => roundRef)).size).toBe(passes.length);
    expect(new Set(events.map(({ name }) => name)).size).toBe(events.length);
  });

  it('runs in order of time, each pass after its reading and within the dates of its event', () => {
    const times = season.passes.map(({ runAt }) => runAt);
    expect([...times].sort()).toEqual(times);
    for (const pass of season.passes) {
      expect(readingOf(pass.readingRef).takenAt < pass.runAt).toBe(true);
      const event = eventOf(roundOf(pass.roundRef).eventRef);
      const day = DateTime.fromISO(pass.runAt, { zone: trackOf(event.trackRef).timeZone }).toISODate()!;
      expect(day >= event.startsOn && day <= event.endsOn).toBe(true);
    }
    expect(times[0]! > '2026-02-01').toBe(true);
    expect(times.at(-1)! < '2026-12-02').toBe(true);
  });

  it('leaves 75 minutes or more from run to run', () => {
    const gaps = season.passes.slice(1).map((pass, i) => Date.parse(pass.runAt) - Date.parse(season.passes[i]!.runAt));
    expect(Math.min(...gaps)).toBeGreaterThanOrEqual(75 * 60_000);
  });

  it('writes each time with the offset its track has then', () => {
    for (const { runAt, utcOffset, roundRef } of season.passes) {
      const { timeZone } = trackOf(eventOf(roundOf(roundRef).eventRef).trackRef);
      expect(IANAZone.isValidZone(timeZone)).toBe(true);
      expect(DateTime.fromISO(runAt, { zone: timeZone }).toFormat('ZZ'), `${timeZone} ${runAt}`).toBe(utcOffset);
    }
  });

  it('has five tracks on the map, one of them high', () => {
    expect(season.tracks).toHaveLength(5);
    expect(Math.max(...season.tracks.map(({ altitudeM }) => altitudeM))).toBeGreaterThan(1500);
    for (const { latitudeDeg, longitudeDeg } of season.tracks) {
      expect(latitudeDeg > 25 && latitudeDeg < 49 && longitudeDeg > -125 && longitudeDeg < -67).toBe(true);
    }
  });

  it('keeps every setting on its step and inside its limits', () => {
    for (const pass of season.passes) {
      for (const { key, step, low, high } of season.adjustables) {
        const value = pass.settings[key]!;
        const steps = (value - low) / step;
        expect(value >= low && value <= high, `${pass.ref} ${key}`).toBe(true);
        expect(Math.abs(steps - Math.round(steps)), `${pass.ref} ${key}`).toBeLessThan(1e-6);
      }
    }
  });

  it('counts the runs on each set of discs', () => {
    for (const { ref } of season.discSets) {
      const runs = season.passes.filter(({ discSetRef }) => discSetRef === ref).map(({ runsOnDiscs }) => runsOnDiscs);
      expect(runs, ref).toEqual(runs.map((_, index) => index));
      expect(runs.length, ref).toBeGreaterThan(0);
    }
  });

  it('has one person in every role, at a domain that cannot exist', () => {
    expect(season.people.map(({ role }) => role).sort()).toEqual([...ROLES].sort());
    for (const { email } of season.people) expect(email).toMatch(/^[a-z]+@slipband\.example$/);
    expect(DEMO_PASSWORD.length).toBeGreaterThanOrEqual(15);
  });
});

describe('the season is as untidy as a real one', () => {
  const { passes } = season;
  const share = (count: number): number => count / passes.length;

  it('has shake, smoke, aborted passes and blanks, but mostly clean passes', () => {
    const count = (outcome: string) => passes.filter((pass) => pass.outcome === outcome).length;
    for (const outcome of ['shake', 'smoke', 'aborted']) expect(count(outcome), outcome).toBeGreaterThanOrEqual(2);
    expect(share(count('clean'))).toBeGreaterThan(0.8);
    const blankSlips = passes.filter(({ slipPct }) => slipPct === null).length;
    expect(blankSlips).toBeGreaterThanOrEqual(3);
    expect(share(blankSlips)).toBeLessThan(0.12);
    expect(season.readings.filter(({ trackTempC }) => trackTempC === null).length).toBeGreaterThanOrEqual(2);
  });

  it('excludes a few passes, each with a reason', () => {
    const excluded = passes.filter((pass) => pass.excluded);
    expect(excluded.length).toBeGreaterThanOrEqual(2);
    for (const { excludedReason } of excluded) expect(excludedReason!.length).toBeGreaterThan(10);
    for (const pass of passes.filter((entry) => !entry.excluded)) expect(pass.excludedReason).toBeNull();
  });

  it('is neither always in the band nor never', () => {
    const slips = passes.flatMap(({ slipPct }) => slipPct ?? []);
    const inBand = slips.filter((slip) => slip >= season.car.bandLowPct && slip <= season.car.bandHighPct).length;
    expect(inBand / slips.length).toBeGreaterThan(0.35);
    expect(inBand / slips.length).toBeLessThan(0.7);
  });

  it('uses both lanes, and more than one way to read humidity and pressure', () => {
    for (const lane of LANES) expect(share(passes.filter((pass) => pass.lane === lane).length)).toBeGreaterThan(0.3);
    expect(new Set(season.readings.map(({ pressureKind }) => pressureKind))).toEqual(new Set(['station', 'altimeter']));
    expect(season.readings.some(({ dewPointC }) => dewPointC !== null)).toBe(true);
    for (const reading of season.readings) {
      const humidities = [reading.relativeHumidity, reading.dewPointC, reading.wetBulbC];
      expect(humidities.filter((value) => value !== null).length).toBeLessThanOrEqual(1);
    }
  });

  it('is set up in reaction to the last pass: less clutch after much slip, more after little', () => {
    const changes = (from: (slip: number) => boolean): number[] =>
      passes.slice(1).flatMap((pass, i) => {
        const before = passes[i]!;
        const sameEvent = roundOf(before.roundRef).eventRef === roundOf(pass.roundRef).eventRef;
        const raced = !roundOf(pass.roundRef).name.startsWith('T');
        if (!sameEvent || !raced || before.slipPct === null || !from(before.slipPct)) return [];
        return [pass.settings.counterweight_g! - before.settings.counterweight_g!];
      });
    expect(mean(changes((slip) => slip > 18))).toBeLessThan(0);
    expect(mean(changes((slip) => slip < 12))).toBeGreaterThan(0);
  });

  it('has slip and times that belong together', () => {
    const timed = passes.filter(({ slipPct, sixtyFtS }) => slipPct !== null && sixtyFtS !== null);
    const sixty = (test: (off: number) => boolean) =>
      mean(timed.filter(({ slipPct }) => test(Math.abs(slipPct! - 15))).map(({ sixtyFtS }) => sixtyFtS!));
    expect(sixty((off) => off > 6)).toBeGreaterThan(sixty((off) => off < 2) + 0.01);
    for (const { sixtyFtS, threeThirtyFtS, eighthS, thousandFtS } of passes) {
      const given = [sixtyFtS, threeThirtyFtS, eighthS, thousandFtS].filter((time) => time !== null);
      expect([...given].sort((a, b) => a - b)).toEqual(given);
    }
  });
});

describe('the open event', () => {
  const { next } = season;

  it('waits for a round that is planned and read but not run, with more to come', () => {
    const round = roundOf(next.roundRef);
    const reading = readingOf(next.readingRef);
    expect(season.passes.some(({ roundRef }) => roundRef === next.roundRef)).toBe(false);
    expect(reading.roundRef).toBe(next.roundRef);
    expect(Object.values(conditionsFromReading(reading)).every((value) => value !== null)).toBe(true);
    const planned = season.rounds.filter(({ eventRef }) => eventRef === round.eventRef);
    expect(planned.at(-1)!.position).toBeGreaterThan(round.position);
    expect(next.at < round.plannedAt).toBe(true);
    expect(next.current).toEqual(season.passes.at(-1)!.settings);
  });

  it('leaves the crew chief something to decide', () => {
    const round = roundOf(next.roundRef);
    const event = eventOf(round.eventRef);
    const suggestion = suggestFor({
      passes: demoPassRows(season).map(toPassRecord),
      context: {
        event: event.name,
        track: trackOf(event.trackRef).name,
        time: next.at,
        round: round.name,
        lane: round.lane,
        conditions: conditionsFromReading(readingOf(next.readingRef)),
        runsOnDiscs: next.runsOnDiscs,
      },
      current: next.current,
      adjustables: [...season.adjustables],
      band: { lowPct: season.car.bandLowPct, highPct: season.car.bandHighPct },
      minutesLeft: next.minutesLeft,
    });
    expect(suggestion.status).toBe('offered');
  });
});
