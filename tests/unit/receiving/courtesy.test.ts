import { EventEmitter } from 'node:events';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { Courtesy } from '#lib/http/courtesy';
import { PeopleUnderWay } from '#lib/http/peopleUnderWay';

beforeEach(() => void vi.useFakeTimers({ now: 0 }));
afterEach(() => void vi.useRealTimers());

function make() {
  const people = new PeopleUnderWay();
  const goOn = vi.fn();
  const courtesy = new Courtesy(people, goOn);
  const ask = () => {
    const response = new EventEmitter();
    people.note(response);
    return response;
  };
  return { people, goOn, courtesy, ask };
}

test('with nobody waiting three large posts are taken at once, not four', () => {
  const { courtesy } = make();
  expect([0, 1, 2, 3].map((underWay) => courtesy.isHeldBack(underWay))).toEqual([false, false, false, true]);
});

test('beside a person the next one waits for the one under way and for a tenth of a second, and is then asked for', () => {
  const { courtesy, goOn, ask } = make();
  expect(courtesy.isHeldBack(0)).toBe(false);
  ask();
  expect([courtesy.isHeldBack(1), courtesy.isHeldBack(0)]).toEqual([true, true]);
  expect(goOn).not.toHaveBeenCalled();
  vi.advanceTimersByTime(100);
  expect(goOn).toHaveBeenCalledTimes(1);
  expect(courtesy.isHeldBack(0)).toBe(false);
});

test('when the last person has been answered what was held back is asked for at once', () => {
  const { courtesy, goOn, ask } = make();
  const [first, second] = [ask(), ask()];
  courtesy.isHeldBack(0);
  expect(courtesy.isHeldBack(0)).toBe(true);
  first.emit('close');
  expect(goOn).not.toHaveBeenCalled();
  second.emit('close');
  expect(goOn).toHaveBeenCalledTimes(1);
  expect(courtesy.isHeldBack(0)).toBe(false);
});

test('a request that lasts counts for two seconds, and once', () => {
  const { people, ask } = make();
  const download = ask();
  vi.advanceTimersByTime(1_999);
  expect(people.count).toBe(1);
  vi.advanceTimersByTime(1);
  expect(people.count).toBe(0);
  download.emit('close');
  expect(people.count).toBe(0);
});
