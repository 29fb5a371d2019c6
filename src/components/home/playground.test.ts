import { describe, expect, it } from 'vitest';
import { readingSentences } from '@/components/ladder/words';
import { acceptFaults } from '@/lib/mechanism/accept-faults';
import { FAULT_CHOICES } from './fault-choices';
import { createPlayground, PLAY_LAYOUT, type PlayState } from './playground';

const flagged = (state: PlayState): number[] => state.rows.filter(({ faults }) => faults > 0).map(({ seq }) => seq);

describe('the machine on the home page', () => {
  it('opens with the missed carry in sight, said in words', () => {
    const { state } = createPlayground();
    // The lowest wheel goes 7, 4, 1, 8, 5: over nine at turns 2, 3 and 5, which are rows 3, 4 and 6.
    expect(state.rows.map(({ words }) => words)).toEqual(['set 7', ...Array<string>(5).fill('turn + ×1')]);
    expect(flagged(state)).toEqual([3, 4, 6]);
    expect(state.result).toBe('00000005');
    const judged = state.rows[2]?.judged;
    expect(judged && readingSentences(judged)[0]).toContain('the carry from wheel 1 was due and was not made');
  });

  it('agrees with every turn once it is healed', () => {
    const play = createPlayground();
    play.give(null);
    play.restart();
    play.setSlide(2, 9);
    for (let turn = 0; turn < 30; turn += 1) play.turn(turn % 5 === 4 ? 'subtract' : 'add');
    play.shift(3);
    play.turn('add');
    play.clear();
    // 97 added 24 times and taken back 6 times, then once at the third place.
    expect(play.state.rows.at(-3)?.words).toBe('carriage 3');
    expect(
      play.state.rows
        .at(-2)
        ?.judged?.result.map(({ read }) => read)
        .reverse()
        .join(''),
    ).toBe(String(97 * 18 + 9700).padStart(8, '0'));
    expect(flagged(play.state)).toEqual([]);
  });

  it('writes a setting down once, with the turn it was made for', () => {
    const play = createPlayground();
    play.restart();
    play.setSlide(1, 4);
    play.setSlide(1, 5);
    play.shift(2);
    play.turn('add');
    play.turn('add');
    expect(play.state.rows.map(({ words }) => words)).toEqual(['set 5', 'carriage 2', 'turn + ×1', 'turn + ×1']);
  });

  it.each(FAULT_CHOICES.map((choice) => [choice.words, choice] as const))(
    '"%s" can be given and shows',
    (_, choice) => {
      const { from, to } = choice.places(PLAY_LAYOUT);
      for (let place = from; place <= to; place += 1) {
        const fault = choice.at(place);
        expect(acceptFaults(PLAY_LAYOUT, [fault]).ok).toBe(true);
        const play = createPlayground();
        play.give(fault);
        play.restart();
        for (let position = 1; position <= 4; position += 1) {
          play.shift(position);
          for (let slide = 1; slide <= 5; slide += 1) play.setSlide(slide, 9 - ((slide + position) % 3));
          for (let turn = 0; turn < 12; turn += 1) play.turn('add');
          for (let slide = 1; slide <= 5; slide += 1) play.setSlide(slide, slide + 1);
          for (let turn = 0; turn < 12; turn += 1) play.turn('add');
        }
        expect(flagged(play.state).length, `${choice.kind} at ${place}`).toBeGreaterThan(0);
      }
    },
  );

  it('keeps the wheels as they stand when a fault comes or goes', () => {
    const play = createPlayground();
    const before = play.state.result;
    expect(play.give({ kind: 'wheel-seized', wheel: 1 }).result).toBe(before);
    expect(play.turn('add').result).toBe(before);
  });
});
