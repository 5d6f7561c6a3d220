"""What came of a series, in words: as lines for a terminal and a file, as a table of its means for the page."""
from __future__ import annotations


def text_of(found: dict, with_means: bool = True) -> list[str]:
    """The record in lines."""
    lines = [f"{species['text']} in {species['unit_text']} {species['basis']}" for species in found["species"]]
    lines.append(f"{found['rows']} rows: {found['good']} restated, {found['bad']} without all their figures, of which {found['put_aside']} put aside by their status"
                 + (f"; {found['outside']} outside the span" if found["outside"] else ""))
    if not with_means:
        return lines + _spans(found["means"])
    lines += [f"  {entry['rows']} × {entry['reason']}" for entry in found["reasons"]]
    lines += [f"  line {entry['line']}: {entry['column']} {entry['reason']}".replace("  ", " ") for entry in found["bad_rows"][:10]]
    if found["means"]:
        lines += _spans(found["means"]) + _means_lines(found["means"])
    return lines


def _means_lines(means: dict) -> list[str]:
    lines = []
    for window in means["windows"]:
        for species in window["species"]:
            highest = species["highest"]
            of_limit = f", {highest['percent_of_limit']:.3g} % of the limit" if highest and highest["percent_of_limit"] is not None else ""
            top = f"; highest {highest['text']} from {highest['from']}{of_limit}" if highest else ""
            over = f"; {species['exceedances']} not within the limit" if species["exceedances"] is not None else ""
            centiles = "".join(f"; {entry['percent']:g}th percentile {entry['value']:.4g}" for entry in species["percentiles"] if entry["value"] is not None)
            lines.append(f"{window['window']}, {species['name']}: {species['means']} means, {species['lacking']} with too little data{top}{centiles}{over}")
    return lines


def _spans(means: dict | None) -> list[str]:
    """Interval, gaps and mass."""
    if means is None:
        return []
    return [f"interval {means['interval_s']:g} s; gaps: {means['gaps']}, {means['gap_hours']:.3g} h missing",
            *(f"mass of {entry['species']}: {entry['text']} in {entry['hours']:.4g} h measured" for entry in means["mass"] or ())]


def statistics_table(found: dict) -> list[list[str]]:
    """The means of each window in one row of words, the header first; none without means."""
    if found["means"] is None or not found["means"]["windows"]:
        return []
    rows = [["means", "of", "with enough data", "with too little", "highest", "its start", "% of the limit", "percentiles", "not within the limit"]]
    for window in found["means"]["windows"]:
        for species in window["species"]:
            highest = species["highest"] or {"text": "", "from": "", "percent_of_limit": None}
            percent = "" if highest["percent_of_limit"] is None else f"{highest['percent_of_limit']:.3g}"
            centiles = ", ".join(f"{entry['percent']:g}th: {entry['value']:.4g}" for entry in species["percentiles"] if entry["value"] is not None)
            over = "" if species["exceedances"] is None else str(species["exceedances"])
            rows.append([window["window"], species["name"], str(species["means"]), str(species["lacking"]), highest["text"], highest["from"], percent, centiles, over])
    return rows
