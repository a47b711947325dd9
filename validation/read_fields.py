#!/usr/bin/python3
"""Reads the fields of a run with two independent readers of the VTU format.

    /usr/bin/python3 validation/read_fields.py FOLDER

FOLDER is that of a run; every file that its fields.pvd names is read by VTK and by meshio (Debian: python3-vtk9, python3-meshio), and the two must agree on points,
cells, kinds and every array. Prints one line `ok N files`, or the faults, one a line; exit code 0 or 1.
"""
import contextlib
import io
import os
import sys
import xml.etree.ElementTree as xml

import meshio
import numpy
import vtk
from vtk.util.numpy_support import vtk_to_numpy

KINDS = {3: "line", 9: "quad", 21: "line3", 23: "quad8"}
SOLIDS = ["displacement [mm]", "stress xx [MPa]", "stress yy [MPa]", "stress zz [MPa]", "stress xy [MPa]", "equivalent stress [MPa]", "plastic strain",
          "temperature [°C]"]
LAYERS = ["displacement [mm]", "opening [mm]", "sliding [mm]", "peel traction [MPa]", "shear traction [MPa]", "damage"]


def arrays(data):
    return {data.GetArrayName(i): vtk_to_numpy(data.GetArray(i)) for i in range(data.GetNumberOfArrays())}


def check(path):
    faults = []
    reader = vtk.vtkXMLUnstructuredGridReader()
    reader.SetFileName(path)
    for event in ("ErrorEvent", "WarningEvent"):
        reader.AddObserver(event, lambda _, what: faults.append(f"VTK: {what}"))
    reader.Update()
    grid = reader.GetOutput()
    with contextlib.redirect_stdout(io.StringIO()) as said:
        mesh = meshio.read(path)
    if said.getvalue().strip():
        faults.append("meshio: " + said.getvalue().strip())

    points = vtk_to_numpy(grid.GetPoints().GetData()) if grid.GetNumberOfPoints() else numpy.zeros((0, 3))
    if not numpy.array_equal(points, mesh.points):
        faults.append("the points differ between the readers")
    kinds = {grid.GetCellType(i) for i in range(grid.GetNumberOfCells())}
    if {KINDS.get(kind, kind) for kind in kinds} != {block.type for block in mesh.cells}:
        faults.append(f"kinds differ: {kinds} and {[block.type for block in mesh.cells]}")
    if grid.GetNumberOfCells() != sum(len(block.data) for block in mesh.cells):
        faults.append("the number of cells differs")
    solids = os.path.basename(path).startswith("solids")
    expected = SOLIDS if solids else LAYERS
    first, second = arrays(grid.GetPointData()), mesh.point_data
    if list(first) != expected or sorted(second) != sorted(expected):
        faults.append(f"arrays at points are {list(first)} and {list(second)}")
    for name in set(first) & set(second):
        if not numpy.array_equal(first[name], second[name]):
            faults.append(f"{name} differs between the readers")
        if not numpy.all(numpy.isfinite(first[name])):
            faults.append(f"{name} has values that are not finite")
    cell_names = ["adherend"] if solids else ["joint", "bonded"]
    if list(arrays(grid.GetCellData())) != cell_names or list(mesh.cell_data) != cell_names:
        faults.append(f"arrays at cells are {list(arrays(grid.GetCellData()))} and {list(mesh.cell_data)}")
    if not solids and kinds == {21}:
        for i in range(grid.GetNumberOfCells()):
            start, end, middle = (numpy.array(grid.GetPoint(grid.GetCell(i).GetPointId(k))) for k in range(3))
            if numpy.linalg.norm(middle - 0.5 * (start + end)) > 0.26 * numpy.linalg.norm(end - start):
                faults.append(f"the middle point of edge {i} is far from its middle")
                break
    if solids and grid.GetNumberOfCells():
        sizes = vtk.vtkMeshQuality()
        sizes.SetInputData(grid)
        sizes.SetQuadQualityMeasureToArea()
        sizes.Update()
        if 9 in kinds and vtk_to_numpy(sizes.GetOutput().GetCellData().GetArray("Quality")).min() <= 0:
            faults.append("a quad has no positive area")
    return faults


def main():
    if len(sys.argv) != 2:
        print(__doc__)
        return 1
    folder = sys.argv[1]
    try:
        listed = [one.get("file") for one in xml.parse(os.path.join(folder, "fields.pvd")).getroot().iter("DataSet")]
    except (OSError, xml.ParseError) as error:
        print(f"fields.pvd: {error}")
        return 1
    failed = False
    for name in listed:
        try:
            faults = check(os.path.join(folder, name))
        except (Exception, SystemExit) as error:  # the readers raise what they like
            faults = [f"{type(error).__name__}: {error}"]
        for fault in faults:
            print(f"{name}: {fault}")
            failed = True
    if not failed:
        print(f"ok {len(listed)} files")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main())
