"""What `tussock install` writes, as Jupyter reads it."""

import xml.etree.ElementTree
from pathlib import Path

from jupyter_client.kernelspec import KernelSpecManager
from kernel_support import PROGRAM


def test_jupyter_finds_the_kernel(installed):
    specification = KernelSpecManager().get_kernel_spec("tussock")
    assert Path(specification.resource_dir) == installed / "share/jupyter/kernels/tussock"
    assert specification.display_name == "Tussock"
    assert specification.language == "tussock"
    assert specification.interrupt_mode == "message"
    program, verb, file = specification.argv
    assert (verb, file) == ("kernel", "{connection_file}")
    assert Path(program).is_absolute()
    assert Path(program).samefile(PROGRAM)


def test_the_logo_is_a_square_picture(installed):
    logo = installed / "share/jupyter/kernels/tussock/logo-svg.svg"
    picture = xml.etree.ElementTree.parse(logo).getroot()
    assert picture.get("width") == picture.get("height") == "64"
