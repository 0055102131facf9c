"""The test suite of the Jupyter project for kernels, with every part that applies.

Left out, for want of the thing: text on standard output or standard error, a pager, clearing an
output. Tussock's answers are tables and paragraphs.
"""

import pytest
from jupyter_kernel_test import IopubWelcomeTests, KernelTests
from kernel_support import ANALYSIS

pytestmark = pytest.mark.timeout(300)


class TestTussock(KernelTests):
    kernel_name = "tussock"
    language_name = "tussock"
    file_extension = ".tus"

    completion_samples = [
        {"text": "sho", "matches": ["show"]},
        {"text": "show omn", "matches": ["omnibus"]},
        {"text": "read sample bas", "matches": ["basil"]},
        {"text": "🌾 sho", "matches": []},
    ]

    complete_code_samples = [
        "",
        "# only a remark",
        "show omnibus of main",
        ANALYSIS,
        "write \"\"\"two\nlines\"\"\"",
    ]
    incomplete_code_samples = [
        "compare alertness, mood",
        "compare alertness,\n  mood",
        "show omnibus of",
        "levels crew.roster fixed,",
        "write \"\"\"two",
    ]
    invalid_code_samples = [
        "shew omnibus of main",
        "show omnibus of main )",
        "show omnibus of\nshow groups of main",
    ]

    code_generate_error = "show omnibus of nobody"

    code_execute_result = [
        {"code": f"{ANALYSIS}\nshow omnibus of main", "mime": "text/plain"},
        {"code": f"{ANALYSIS}\nshow groups of main", "mime": "text/html"},
        {"code": f"{ANALYSIS}\nshow functions of main", "mime": "text/markdown"},
    ]
    code_display_data = [
        {"code": f"{ANALYSIS}\nshow omnibus of main\nshow groups of main", "mime": "text/html"},
        {"code": "write \"A paragraph.\"", "mime": "text/markdown"},
    ]

    supported_history_operations = ("tail", "range", "search")
    code_history_pattern = "*show omnibus of main"

    code_inspect_sample = "compare"


class TestWelcome(IopubWelcomeTests):
    kernel_name = "tussock"
    support_iopub_welcome = True


# The base classes would be collected under the names of their import as well.
del KernelTests, IopubWelcomeTests
