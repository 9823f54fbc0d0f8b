"""Reads the sample result (tests/io/sample_results.cpp) with h5py, as a user would.

usage: read_result.py RESULT.h5 DATASETS.md
"""

import hashlib
import re
import sys
import unittest

import h5py
import numpy as np

RESULT, PAGE = sys.argv[1:3]


def datasets(file):
    """All datasets of the file by path."""
    found = {}

    def visit(name, item):
        if isinstance(item, h5py.Dataset):
            found["/" + name] = item

    file.visititems(visit)
    return found


class ReadResult(unittest.TestCase):
    def setUp(self):
        self.file = h5py.File(RESULT, "r")
        self.surface = self.file["surface"]

    def tearDown(self):
        self.file.close()

    def test_root_attributes(self):
        root = self.file.attrs
        self.assertEqual(root["program"], "panelwright")
        self.assertEqual(root["version"], "0.1.0")
        self.assertEqual(root["commit"], "0123456789abcdef-dirty")
        self.assertEqual(root["format_version"], 1)
        self.assertEqual(root["created_utc"], "2026-03-01T06:30:00Z")
        self.assertEqual(root["host"], "deichwache-süd")
        self.assertEqual(root["threads"], 2)
        self.assertEqual(root["title"], "river gauge, hill-top panel – 869.5 MHz")
        self.assertIn("exp(+j omega t)", root["time_factor"])
        self.assertIn("right-handed", root["frame"])
        self.assertEqual(list(root["methods"]), ["surface", "aperture"])

    def test_case_is_verbatim(self):
        case = self.file["case"]
        raw = case[()]
        self.assertEqual(raw, 'title = "river gauge, hill-top panel – 869.5 MHz"\n# verbatim\r\n'.encode())
        self.assertEqual(self.file.attrs["case_sha256"], hashlib.sha256(raw).hexdigest())
        self.assertEqual(case.attrs["resolved"], raw.decode() + '[solve]\naccuracy = "normal"\n')

    def test_every_dataset_says_what_it_is(self):
        found = datasets(self.file)
        self.assertGreater(len(found), 70)
        for path, dataset in found.items():
            self.assertIsInstance(dataset.attrs["units"], str, path)
            self.assertIsInstance(dataset.attrs["description"], str, path)
            self.assertTrue(dataset.attrs["units"], path)
            self.assertTrue(dataset.attrs["description"], path)

    def test_units_agree_with_names(self):
        units = {"hz": "Hz", "deg": "deg", "db": "dB", "dbi": "dBi", "m": "m", "w": "W", "ohm": "ohm", "percent": "%"}
        for path, dataset in datasets(self.file).items():
            ending = path.rpartition("_")[2]
            if ending in units and not path.endswith("s_per_m"):
                self.assertEqual(dataset.attrs["units"], units[ending], path)

    def test_every_dimension_has_a_named_scale_of_its_length(self):
        for path, dataset in datasets(self.file).items():
            for i, dimension in enumerate(dataset.dims):
                self.assertTrue(dimension.label, path)
                if h5py.h5ds.is_scale(dataset.id):
                    self.assertEqual(dataset.attrs["NAME"].decode(), dimension.label, path)
                    continue
                self.assertEqual(dimension.keys(), [dimension.label], path)
                self.assertEqual(dimension[0].shape, (dataset.shape[i],), path)

    def test_names_of_dimensions(self):
        def labels(path):
            return tuple(dimension.label for dimension in self.file[path].dims)

        self.assertEqual(labels("frequency_hz"), ("frequency",))
        self.assertEqual(labels("surface/s11"), ("frequency",))
        self.assertEqual(labels("surface/pattern/e_theta"), ("frequency", "theta", "phi"))
        self.assertEqual(labels("surface/figures/peak_gain_dbi"), ("frequency",))
        self.assertEqual(labels("surface/mesh/points_m"), ("point", "xyz"))
        self.assertEqual(labels("surface/mesh/triangles"), ("triangle", "corner"))
        self.assertEqual(labels("surface/currents/surface_current"), ("frequency", "triangle", "xyz"))
        self.assertEqual(self.file["surface/s11"].dims[0][0], self.file["frequency_hz"])
        self.assertEqual(
            self.file["surface/figures/peak_gain_dbi"].dims[0][0], self.file["surface/pattern/frequency_hz"]
        )

    def test_page_lists_every_dataset(self):
        with open(PAGE, encoding="utf-8") as page:
            known = set(re.findall(r"^\| `(/[^`]+)` \|", page.read(), re.MULTILINE))
        for path in datasets(self.file):
            general = re.sub("^/(surface|aperture)/", "/METHOD/", path)
            general = re.sub("^/METHOD/health/.*", "/METHOD/health/NAME", general)
            self.assertIn(general, known)

    def test_port(self):
        np.testing.assert_array_equal(self.file["frequency_hz"], 840e6 + 15e6 * np.arange(5))
        impedance = self.surface["impedance_ohm"][:]
        self.assertEqual(impedance.dtype, np.complex128)
        np.testing.assert_array_equal(impedance, 52 + np.arange(5) / 3 + 1j * (10.0 * np.arange(5) - 20))
        s11 = (impedance - 50) / (impedance + 50)
        # One subtraction, one sum and one quotient of complex numbers: a few units in the last place.
        np.testing.assert_allclose(self.surface["s11"], s11, rtol=0, atol=1e-15)
        self.assertEqual(self.surface["band/best_match_db"][()], -100 / 3)
        self.assertTrue(np.isnan(self.surface["band/bandwidth_percent"][()]))

    def test_pattern(self):
        pattern = self.surface["pattern"]
        np.testing.assert_array_equal(pattern["theta_deg"], np.arange(7) * 30.0)
        np.testing.assert_array_equal(pattern["phi_deg"], np.arange(12) * 30.0)
        np.testing.assert_array_equal(pattern["frequency_hz"], [869.5e6, 879.5e6])
        p, t, q = np.ogrid[0:2, 0:7, 0:12]
        e_theta, e_phi = pattern["e_theta"][:], pattern["e_phi"][:]
        self.assertEqual(e_theta.dtype, np.complex128)
        np.testing.assert_array_equal(e_theta, (t + 1) / (q + 3) + 1j * (p - 0.25))
        np.testing.assert_array_equal(e_phi, t / 7 - 1j * (q + p))
        eta = 4e-7 * np.pi * 299792458
        gain = 10 * np.log10(4 * np.pi * (abs(e_theta) ** 2 + abs(e_phi) ** 2) / (2 * eta))
        # eta here is the value before 2019; it differs from CODATA 2018 by 5.5e-10, or 2.4e-9 dB.
        np.testing.assert_allclose(pattern["gain_dbi"], gain, rtol=0, atol=1e-8)

    def test_figures_powers_and_health(self):
        figures = self.surface["figures"]
        np.testing.assert_array_equal(figures["peak_gain_dbi"], [0.0, 1.0])
        np.testing.assert_array_equal(figures["boresight_gain_dbi"], [1 / 3, 1 / 3 + 1])
        self.assertTrue(np.isnan(figures["axial_ratio_db"][:]).all())
        np.testing.assert_array_equal(self.surface["power/radiated_w"], [0.9, 0.9 - 1 / 30])
        health = self.surface["health"]
        self.assertEqual(list(health.attrs["names"]), ["power_balance", "unknowns", "condition"])
        np.testing.assert_array_equal(health["power_balance"], [1.001, 0.998])
        self.assertEqual(health["unknowns"].shape, ())
        self.assertEqual(health["unknowns"][()], 12.0)
        self.assertEqual(
            self.surface["remarks"].asstr()[0], "The spacer is 0.04 wavelengths high – near the limit."
        )

    def test_mesh_and_currents(self):
        mesh = self.surface["mesh"]
        self.assertEqual(mesh["points_m"].shape, (10, 3))
        np.testing.assert_array_equal(mesh["points_m"][3], [1 / 3, 1 / 7, 0.015])
        self.assertEqual(mesh["triangles"].shape, (8, 3))
        np.testing.assert_array_equal(mesh["triangles"][:2], [[0, 2, 1], [1, 2, 3]])
        np.testing.assert_array_equal(mesh["part"], [0, 0, 1, 1, 2, 2, 3, 3])
        current = self.surface["currents/surface_current"][:]
        self.assertEqual(current.shape, (2, 8, 3))
        np.testing.assert_array_equal(current[1, :, 0], np.arange(8) / 3)
        np.testing.assert_array_equal(current[1, :, 1], np.full(8, 1j))
        np.testing.assert_array_equal(current[0, :, 2], np.full(8, -1))

    def test_panel(self):
        panel = self.file["panel"]
        self.assertEqual(panel["patch/length_m"][()], 0.147)
        self.assertEqual(panel["reflector/conductivity_s_per_m"][()], np.inf)
        self.assertEqual(panel["feed/kind"].asstr()[()], "probe")
        self.assertEqual(panel["feed/x_m"][()], -0.038)
        self.assertEqual(panel["feed/impedance_ohm"][()], 50)
        np.testing.assert_array_equal(panel["post/diameter_m"], [0.003, 0.004])

    def test_superblock_is_the_oldest(self):
        with open(RESULT, "rb") as file:
            self.assertEqual(file.read(9), b"\x89HDF\r\n\x1a\n\x00")


if __name__ == "__main__":
    unittest.main(argv=sys.argv[:1])
