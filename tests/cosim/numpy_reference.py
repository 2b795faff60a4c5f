"""Firings and margins of traces, from the trigger rules alone, with NumPy.

An independent second reading of docs/triggers.md: cumulative sums and searches instead of a
machine that steps through samples. Used by the tests, and by hand:

    numpy_reference.py SETTINGS.json TRACES.npy FIRINGS.csv [MARGINS.csv]
    numpy_reference.py --batch LIST.txt       one such line of four paths for each case

SETTINGS.json:
    {"sample_rate_mhz": 100, "contiguous": false, "start_ns": [0, ...] (optional, one a trace),
     "triggers": [{"name": "long", "kind": "time_over_threshold", "baseline_counts": [...],
                   "channel_enabled": [...], "level_counts": [...], "window_samples": 150,
                   "min_samples_over": 21, "length_samples": 1, "sum_counts": [...], "majority": 2,
                   "enabled": true, "hold_off_samples": 0, "rearm": "edge", "prescale": 1}]}
Channel values may be one number for all. TRACES.npy: shape (traces, channels, samples).
Samples, also onset samples, are counted from the start of their trace.
"""
import csv
import json
import sys

import numpy as np


def per_channel(value, channels):
    return np.broadcast_to(np.asarray(value, dtype=np.int64), (channels,))


def trailing_sum(values, length):
    """Sum over the last `length` samples of each channel; what is before the start counts 0."""
    total = np.cumsum(values, axis=1)
    before = np.zeros_like(total)
    before[:, length:] = total[:, :-length]
    return total - before


def reach_of(trigger):
    return {"threshold": 1, "time_over_threshold": trigger.get("window_samples", 1),
            "boxcar_sum": trigger.get("length_samples", 1)}[trigger["kind"]]


def excess_of(trigger, codes):
    """Per channel and sample: by how much the channel is beyond its own requirement (>= 0 votes)."""
    channels = codes.shape[0]
    height = codes - per_channel(trigger["baseline_counts"], channels)[:, None]
    kind = trigger["kind"]
    if kind == "boxcar_sum":
        return trailing_sum(height, reach_of(trigger)) - per_channel(trigger["sum_counts"], channels)[:, None]
    above = height - per_channel(trigger["level_counts"], channels)[:, None]
    if kind == "threshold":
        return above
    return trailing_sum((above >= 0).astype(np.int64), reach_of(trigger)) - trigger["min_samples_over"]


def enabled_channels(trigger, channels):
    return np.flatnonzero(np.broadcast_to(np.asarray(trigger.get("channel_enabled", True), dtype=bool), (channels,)))


def margin_per_sample(trigger, codes):
    """The majority-th largest excess of the enabled channels: the condition is true where >= 0."""
    used = enabled_channels(trigger, codes.shape[0])
    excess = np.sort(excess_of(trigger, codes)[used], axis=0)
    return excess[len(used) - trigger["majority"]]


def onset_samples(trigger, codes, samples):
    """Earliest over-sample in the window among the channels that made the condition true."""
    first = np.maximum(samples - reach_of(trigger) + 1, 0)
    if trigger["kind"] == "boxcar_sum":
        return first
    channels, length = codes.shape
    height = codes - per_channel(trigger["baseline_counts"], channels)[:, None]
    over = height >= per_channel(trigger["level_counts"], channels)[:, None]
    index = np.where(over, np.arange(length), length)
    next_over = np.minimum.accumulate(index[:, ::-1], axis=1)[:, ::-1]
    used = enabled_channels(trigger, channels)
    votes = excess_of(trigger, codes)[used][:, samples] >= 0
    return np.where(votes, next_over[used][:, first], length).min(axis=0, initial=length)


def after_hold_off(is_true, rising, hold_off, fires_again):
    """(samples let through, edges stopped). Jumps from one firing to the next."""
    let_through = []
    free_from = 0
    while True:
        position = np.searchsorted(rising, free_from)
        following = rising[position] if position < len(rising) else None
        if fires_again and let_through and free_from < len(is_true) and is_true[free_from]:
            following = free_from
        if following is None:
            break
        let_through.append(int(following))
        free_from = following + hold_off + 1
    let_through = np.array(let_through, dtype=np.int64)
    return let_through, np.setdiff1d(rising, let_through)


def firings_of(trigger, codes):
    """Rows (sample, onset_sample, status, start_unknown) in order of samples."""
    is_true = margin_per_sample(trigger, codes) >= 0
    rising = np.flatnonzero(is_true & ~np.concatenate(([False], is_true[:-1])))
    status = {}
    if trigger.get("enabled", True):
        let_through, stopped = after_hold_off(is_true, rising, trigger.get("hold_off_samples", 0),
                                              trigger.get("rearm", "edge") == "level")
        number = np.arange(1, len(let_through) + 1)
        passes = number % trigger.get("prescale", 1) == 0
        status.update(dict.fromkeys(let_through[passes].tolist(), "passed"))
        status.update(dict.fromkeys(let_through[~passes].tolist(), "prescaled"))
        status.update(dict.fromkeys(stopped.tolist(), "held_off"))
    else:
        status.update(dict.fromkeys(rising.tolist(), "disabled"))
    samples = np.array(sorted(status), dtype=np.int64)
    onsets = onset_samples(trigger, codes, samples)
    return [(s, o, status[s], int(s < reach_of(trigger))) for s, o in zip(samples.tolist(), onsets.tolist())]


def time_text(settings, trace, sample):
    starts = settings.get("start_ns")
    if not starts:
        return ""
    rate_khz = round(settings["sample_rate_mhz"] * 1000)
    return str(starts[trace] + (2 * sample * 1_000_000 + rate_khz) // (2 * rate_khz))


def rows_of(settings, traces):
    """Rows of both tables, ordered by trace, then by the triggers' order."""
    count, channels, length = traces.shape
    if settings.get("contiguous", False):
        stretches = [np.concatenate(list(traces), axis=1)] if count else []
    else:
        stretches = list(traces)
    firings = []
    margins = []
    for first_trace, stretch in enumerate(stretches):
        codes = stretch.astype(np.int64)
        for order, trigger in enumerate(settings["triggers"]):
            for sample, onset, status, unknown in firings_of(trigger, codes):
                trace = first_trace + sample // length
                start = (trace - first_trace) * length
                firings.append(((trace, order, sample), [trace, trigger["name"], sample - start,
                                time_text(settings, trace, sample - start), onset - start, status, unknown]))
            margin = margin_per_sample(trigger, codes).reshape(-1, length)
            unit = "samples" if trigger["kind"] == "time_over_threshold" else "counts"
            for k, best in enumerate(margin.argmax(axis=1).tolist()):
                trace = first_trace + k
                margins.append(((trace, order), [trace, trigger["name"], best, int(margin[k, best]), unit]))
    return [row for _, row in sorted(firings, key=lambda pair: pair[0])], \
           [row for _, row in sorted(margins, key=lambda pair: pair[0])]


def write_csv(path, header, rows):
    with open(path, "w", newline="", encoding="ascii") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(header)
        writer.writerows(rows)


def run_case(settings_path, traces_path, firings_path, margins_path=None):
    with open(settings_path, encoding="utf-8") as file:
        settings = json.load(file)
    firings, margins = rows_of(settings, np.load(traces_path))
    write_csv(firings_path, ["trace", "trigger", "sample", "time_ns", "onset_sample", "status", "start_unknown"],
              firings)
    if margins_path:
        write_csv(margins_path, ["trace", "trigger", "sample", "margin", "unit"], margins)


def main(arguments):
    if len(arguments) == 2 and arguments[0] == "--batch":
        with open(arguments[1], encoding="utf-8") as file:
            for line in file:
                run_case(*line.split())
        return 0
    if len(arguments) not in (3, 4):
        print(__doc__, file=sys.stderr)
        return 2
    run_case(*arguments)
    return 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
