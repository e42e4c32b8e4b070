"""Reads the document `tarebook.loading-basis/1` into a `fleet.basis.Basis`, or says all that is wrong with
it.
"""

from fleet.basis_reading.reading import basis_from_text, read_basis

__all__ = ["basis_from_text", "read_basis"]
