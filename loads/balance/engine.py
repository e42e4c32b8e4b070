"""The version of the computation. It stands in every statement, and changes whenever any result could
change.
"""

ENGINE_VERSION = "3"
