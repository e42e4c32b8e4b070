"""Every refusal of a loading basis, word by word, as the files in `refusals` tell them: each file by the
readers of its section, and `the_whole_basis` by all of them after the schema.

A case is a few changes to the basis that has one of everything, `pointer = value` or `pointer gone`, and
beneath them, indented, all faults in their order: `pointer code: sentence`; or `is read`.
"""

import json
from pathlib import Path

import pytest

from fleet.basis_reading import read_basis
from fleet.basis_reading.configurations import read_configurations
from fleet.basis_reading.curtailments import read_curtailments
from fleet.basis_reading.datums import read_other_datums
from fleet.basis_reading.envelopes import lateral_limits_entered, read_envelopes
from fleet.basis_reading.findings import Findings
from fleet.basis_reading.fuel import read_burn_order, read_tanks, read_taxi_order
from fleet.basis_reading.fuel_balance import read_fuel_balance
from fleet.basis_reading.lateral import read_lateral_by_cg
from fleet.basis_reading.limits import read_limits
from fleet.basis_reading.performance import read_performance
from fleet.basis_reading.positions import read_positions
from fleet.basis_reading.presentation import read_presentation
from fleet.basis_reading.running_sums import read_conditions, read_cumulative
from fleet.basis_reading.samples import read_sample_loads
from fleet.basis_reading.stations import read_places, read_seats, read_zones
from fleet.basis_reading.trim import read_trim
from fleet.basis_reading.variants import read_variants
from records.refusal import Invalid
from tests.pure.fleet.documents import changed
from tests.pure.fleet.everything import everything

FOLDER = Path(__file__).parent / "refusals"


def stations(findings):
    for read in (read_seats, read_places, read_zones, read_conditions, read_cumulative):
        read(findings)


def configurations(findings):
    read_configurations(findings, read_variants(findings, read_limits(findings)))
    read_performance(findings, findings.document.get("performance"), "/performance")


def fuel(findings):
    read_tanks(findings)
    read_taxi_order(findings, read_burn_order(findings))
    read_fuel_balance(findings)


def envelopes(findings):
    found = read_envelopes(findings, read_variants(findings, read_limits(findings)))
    lateral_limits_entered(findings, found)
    read_lateral_by_cg(findings)


def presentation(findings):
    read_envelopes(findings, read_variants(findings, read_limits(findings)))
    read_presentation(findings)


def curtailments(findings):
    found = read_envelopes(findings, read_variants(findings, read_limits(findings)))
    read_curtailments(findings, found)


READERS = {
    "configurations": configurations,
    "curtailments": curtailments,
    "datums": read_other_datums,
    "envelopes": envelopes,
    "fuel": fuel,
    "positions": read_positions,
    "presentation": presentation,
    "sample_loads": read_sample_loads,
    "stations": stations,
    "trim": read_trim,
}


WHOLE = "the_whole_basis"


def faults_of(name, document):
    if name == WHOLE:
        try:
            read_basis(document)
        except Invalid as refused:
            return refused.faults
        return ()
    findings = Findings(document, [])
    READERS[name](findings)
    return dict.fromkeys(findings.faults)


def cases():
    for name in (*READERS, WHOLE):
        for block in (FOLDER / f"{name}.txt").read_text("utf-8").split("\n\n")[1:]:
            yield pytest.param(name, block.rstrip().split("\n"), id=f"{name} {block.split(chr(10))[0]}")


def spoiled(lines):
    document = everything()
    for line in lines:
        pointer, _, value = line.partition(" = ")
        gone = pointer.endswith(" gone")
        document = changed(document, pointer.removesuffix(" gone"), ... if gone else json.loads(value))
    return document


@pytest.mark.parametrize(("name", "lines"), list(cases()))
def test_a_section_is_refused_by_field_code_and_sentence_or_read(name, lines):
    faults = faults_of(name, spoiled(line for line in lines if line.startswith("/")))

    told = [f"{fault.pointer} {fault.code}: {fault.detail}" for fault in faults]
    assert (told or ["is read"]) == [line.strip() for line in lines if not line.startswith("/")]


def test_the_basis_that_has_everything_is_sound_and_every_file_is_read():
    assert read_basis(everything())
    assert {path.stem for path in FOLDER.iterdir()} == {*READERS, WHOLE}
