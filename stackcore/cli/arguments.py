"""Arguments of a command, whose faults are told like any other."""

import argparse
from typing import NoReturn

from stackcore.errors import Fault, InputError


class Parser(argparse.ArgumentParser):
    """A parser whose complaint is a fault like any other."""

    def error(self, message: str) -> NoReturn:
        raise InputError([Fault("", message, f"see {self.prog} --help")])
