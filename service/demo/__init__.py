"""The invented operator and its invented day, entered on the first start."""

from service.demo.run import run

__all__ = ["run"]
