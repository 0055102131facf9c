"""How closely each answer must agree with its reference: one table, which may only be tightened."""

# The tolerance of everything that is not named below, relative.
USUAL = 1e-12

# Cases whose answers are limited by the rounding of the data to doubles: the limit and its reason.
EXCEPTIONS = {
    "offset_1e6": (5e-11, "spread 1 at 1e6, where a double is off by up to 6e-11"),
    "offset_1e9": (5e-8, "spread 1 at 1e9, where a double is off by up to 6e-8"),
    "offset_1e12": (5e-5, "spread 1 at 1e12, where a double is off by up to 6e-5"),
    "nearsing_1e-4": (2e-11, "1e-4 is left of an outcome whose residuals are rounded at 4e-16"),
    "nearsing_1e-7": (2e-8, "1e-7 is left of an outcome whose residuals are rounded at 4e-16"),
    "nearsing_1e-10": (2e-5, "1e-10 is left of an outcome whose residuals are rounded at 4e-16"),
    "huge_effect": (1e-11, "an effect of 1e5 standard deviations: one rounding of it is 1e-11"),
    "huge_effect as doubles": (
        1e-11,
        "an effect of 1e5 standard deviations: one rounding of it is 1e-11",
    ),
}


class Check:
    """The comparison of one case with its reference."""

    def __init__(self, case=""):
        self.case = case
        self.tolerance, self.reason = EXCEPTIONS.get(case, (USUAL, "the usual limit"))

    def close(self, what, found, expected, scale=None):
        """Agreement relative to the reference, or to a scale where the reference may be near zero."""
        found, expected = float(found), float(expected)
        scale = abs(expected) if scale is None else float(scale)
        error = 0.0 if found == expected else abs(found - expected)
        assert error <= self.tolerance * scale, (
            f"{self.case}: {what} is {found!r}, expected {expected!r}: "
            f"off by {error / scale if scale else error:.1e}, limit {self.tolerance:.0e} ({self.reason})"
        )

    def p(self, what, found_p, found_ln_p, p, ln_p):
        """A relative error of F returns in p multiplied by up to |ln p|; below 1e-300 only the
        logarithm is left."""
        p, ln_p = float(p), float(ln_p)
        magnified = max(abs(ln_p), 1.0)
        self.close(f"ln p of {what}", found_ln_p, ln_p, magnified)
        if p > 1e-300:
            self.close(f"p of {what}", found_p, p, p * magnified)
        else:
            assert 0.0 <= found_p < 1e-300, f"{what}: {found_p}"
