"""The figures in stored versions, read once and remembered by their text."""

from fleet.basis import Basis
from fleet.basis_reading import basis_from_text
from fleet.models import LoadingBasis


def basis_of(version: LoadingBasis) -> Basis:
    """This function will return the figures of a stored loading basis."""
    return basis_from_text(version.document)


def fit_of(basis: Basis, configuration: str) -> str | None:
    """This function will return the base fit a configuration is flown on, None if it is not of this basis."""
    return next((each.fit for each in basis.configurations if each.id == configuration), None)
