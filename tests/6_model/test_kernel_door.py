"""The door to the CAD kernel: what it says when the kernel does not load, and what it refuses."""

import os
import subprocess
import sys

import pytest

from fabgen.errors import MachineError, ProgramError
from fabgen.model.kernel import bounds_mm, cq, on_bed, part_of, solid_of, volume_mm3


def failing(message):
    """A cadquery that fails to load."""
    return f"raise ImportError({message!r})\n"


def import_kernel_with(tmp_path, root, cadquery):
    """Import the door in a fresh interpreter with this for cadquery; its stdout."""
    (tmp_path / "cadquery.py").write_text(cadquery, encoding="utf-8")
    script = (
        "from fabgen.errors import MachineError\n"
        "try:\n    import fabgen.model.kernel\n"
        "except MachineError as error:\n    print(error.exit_code, error.message, '|', error.fix)\n"
    )
    path = os.pathsep.join([str(tmp_path), str(root)])
    done = subprocess.run(
        [sys.executable, "-c", script],
        env=os.environ | {"PYTHONPATH": path},
        capture_output=True,
        text=True,
        check=True,
    )
    return done.stdout


def test_missing_system_library_is_named_with_its_package(tmp_path, root):
    said = import_kernel_with(
        tmp_path, root, failing("libGL.so.1: cannot open shared object file: No such file or directory")
    )
    assert said.startswith("3 ")
    assert "libGL.so.1" in said
    assert "libgl1" in said.partition("|")[2]


def test_any_other_failure_to_load_is_a_machine_error_too(tmp_path, root):
    said = import_kernel_with(tmp_path, root, failing("No module named 'OCP'"))
    assert said.startswith("3 ")
    assert "libgl1" not in said


def test_ctrl_c_while_the_kernel_loads_waits_until_it_has_loaded(tmp_path, root):
    press = "import os, signal\nos.kill(os.getpid(), signal.SIGINT)\n"
    (tmp_path / "cadquery.py").write_text(press + "loaded = True\n", encoding="utf-8")
    script = (
        "import sys\n"
        "try:\n    import fabgen.model.kernel\n"
        "except KeyboardInterrupt:\n    print('stopped', sys.modules['cadquery'].loaded)\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", script],
        env=os.environ | {"PYTHONPATH": os.pathsep.join([str(tmp_path), str(root)])},
        capture_output=True,
        text=True,
        check=True,
    )
    assert done.stdout == "stopped True\n"


def test_windows_library_is_not_loaded_and_not_missed():
    """VTK as a whole takes a third of the kernel's load; what the kernel itself uses of it works without."""
    script = (
        "import gc, sys\nfrom fabgen.model.kernel import cq\n"
        "print('vtkmodules.vtkRenderingVolume' in sys.modules, 'vtk' in sys.modules, gc.isenabled())\n"
        "print(cq.Workplane().box(1, 2, 3).val().toVtkPolyData(0.1).GetNumberOfPoints() > 0)\n"
        "import vtk\nprint(vtk.vtkSphereSource.__name__)\n"
    )
    done = subprocess.run([sys.executable, "-c", script], capture_output=True, text=True, check=True)
    assert done.stdout.splitlines() == ["False False True", "True", "vtkSphereSource"]


def test_who_asks_the_windows_library_for_something_while_loading_gets_it(tmp_path, root):
    asking = "from vtk import vtkSphereSource\nraise ImportError('found ' + vtkSphereSource.__name__)\n"
    said = import_kernel_with(tmp_path, root, asking)
    assert "found vtkSphereSource" in said


def test_a_machine_error_exits_with_three():
    assert MachineError("x").exit_code == 3


def test_a_part_in_two_pieces_is_the_programs_error():
    two = cq.Workplane().box(1, 1, 1).union(cq.Workplane("XY", origin=(5, 0, 0)).box(1, 1, 1)).val()
    with pytest.raises(ProgramError, match="2 solids"):
        part_of(two)
    with pytest.raises(ProgramError):
        solid_of(cq.Workplane(two))


def test_measures_of_a_known_box():
    part = cq.Workplane("XY", origin=(1, 2, 3)).box(2, 4, 6)
    assert volume_mm3(part) == pytest.approx(48.0, rel=1e-12)
    assert bounds_mm(part) == ((0.0, 0.0, 0.0), (2.0, 4.0, 6.0))
    low, high = bounds_mm(on_bed(part.translate((0, 0, -7))))
    assert (low[2], high[2]) == pytest.approx((0.0, 6.0), abs=1e-9)
