"""Keeps what must come back out and must not stand readable in the database: encrypted, with a key made from
SECRET_KEY, one for each purpose.

A changed SECRET_KEY opens nothing that was sealed before, and says so.
"""

import base64
from functools import lru_cache

from cryptography.fernet import Fernet, InvalidToken
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.hazmat.primitives.kdf.hkdf import HKDF
from django.conf import settings


class SealBroken(ValueError):
    """What was sealed does not open: another key, another purpose, or altered bytes."""


def sealed(content: bytes, purpose: str) -> bytes:
    """This function will encrypt `content`, so that only the same purpose opens it."""
    return _locked(settings.SECRET_KEY, purpose).encrypt(content)


def opened(content: bytes, purpose: str) -> bytes:
    """This function will return what was sealed for this purpose; raises SealBroken."""
    try:
        return _locked(settings.SECRET_KEY, purpose).decrypt(content)
    except InvalidToken:
        raise SealBroken(f"what was sealed for {purpose} does not open with the key of now") from None


@lru_cache(maxsize=16)
def _locked(key: str, purpose: str) -> Fernet:
    made = HKDF(SHA256(), 32, salt=b"tarebook.sealing/1", info=purpose.encode()).derive(key.encode())
    return Fernet(base64.urlsafe_b64encode(made))
