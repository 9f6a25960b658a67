"""Ranges in which the quantities of meters, valves and components lie, in coherent SI."""

from __future__ import annotations

from collections.abc import Mapping

METER_RANGES: Mapping[str, tuple[float, float]] = {
    "beta_d": (0.2, 0.74), "C": (0.55, 0.99), "eps": (0.85, 0.999), "tau_p": (0.76, 0.98),
    "D": (0.051, 0.9), "Re_D": (2e4, 5e6), "A_RG": (0.002, 0.3), "L_1": (0.03, 1.0),
    "Lp_2": (0.03, 0.5), "Mp_2": (0.1, 2.0), "kappa": (1.05, 1.66), "eta": (8e-6, 4e-5),
    "alpha": (1e-6, 2e-5), "mu_JT": (1e-7, 1e-5), "dp": (1e3, 5e4), "dw": (5e2, 4e4),
    "K_w": (0.1, 50.0), "xi_w": (0.05, 0.9), "E": (1.0001, 1.3), "U": (0.001, 0.05),
    "Re_nt": (4e5, 1e6), "Re_d": (2e4, 5e6), "C_star": (0.6, 0.75), "A_2t": (1.05, 3.0),
    "r": (0.6, 0.99), "K_v": (1e-4, 0.02), "C_v": (1e-4, 0.02), "K_vs": (3e-4, 0.05),
    "R_0": (20.0, 60.0), "h": (0.1, 0.95), "x_dp": (0.02, 0.4), "x_T": (0.2, 0.84),
    "x_TP": (0.2, 0.8), "x_ch": (0.3, 0.9), "F_gamma": (0.8, 1.2), "Y": (0.67, 0.99),
    "F_P": (0.6, 1.0), "F_d": (0.1, 1.0), "F_rec": (0.5, 0.98), "Re_v": (1e4, 1e6),
    "zeta": (0.05, 1.5),
    "C_son": (1e-9, 1e-7), "C_I": (1e-9, 1e-7), "C_II": (1e-9, 1e-7), "b_cr": (0.1, 0.6),
    "b_I": (0.1, 0.6), "b_II": (0.1, 0.6), "m_sub": (0.3, 0.7), "dp_c": (1e3, 1e4),
    "alpha_12": (1.05, 10.0), "A_eff": (1e-6, 1e-4), "L_tube": (0.1, 20.0),
    "d_tube": (0.002, 0.02),
}  # fmt: skip
