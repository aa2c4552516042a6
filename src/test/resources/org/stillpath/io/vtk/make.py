# Makes the files beside it with VTK's own writers: python3 make.py FOLDER
import os
import sys

import vtk
from vtkmodules.util.numpy_support import numpy_to_vtk
import numpy as np
out=sys.argv[1]; os.makedirs(out,exist_ok=True)
X=[-2.0,-0.5,1.0,2.5]; Y=[0.0,1.0,3.0]; Z=[0.0,2.0]
def f(x,y,z): return 1.5+0.01*x-0.02*y+0.003*z+0.001*x*y*z
def arr(a,name,dt=np.float64):
    v=numpy_to_vtk(np.array(a,dtype=dt),deep=1); v.SetName(name); return v
def rect():
    g=vtk.vtkRectilinearGrid(); g.SetDimensions(4,3,2)
    g.SetXCoordinates(arr(X,'x')); g.SetYCoordinates(arr(Y,'y')); g.SetZCoordinates(arr(Z,'z'))
    return g
def image():
    g=vtk.vtkImageData(); g.SetExtent(-1,2,0,2,1,2); g.SetOrigin(0.5,0,-2); g.SetSpacing(1.5,1,2)  # x -1..3.5, y 0..2, z 0..2
    return g
def fill(g,dt=np.float64,extra=True):
    n=g.GetNumberOfPoints(); p=[g.GetPoint(i) for i in range(n)]
    a=arr([f(*q) for q in p],'n index' if extra else 'n',dt); 
    if extra:
        g.GetPointData().AddArray(arr([[1,2,3]]*n,'flow'))
        g.GetPointData().AddArray(arr([300+q[0] for q in p],'T',np.float32))
        g.GetCellData().AddArray(arr([7]*g.GetNumberOfCells(),'zone',np.int32))
        g.GetFieldData().AddArray(arr([1.25],'TIME'))
    g.GetPointData().AddArray(a)
    if extra: g.GetPointData().SetActiveScalars('n index')
    return g
def legacy(g,cls,name,binary,ver=None):
    w=cls(); w.SetInputData(g); w.SetFileName(f'{out}/{name}')
    w.SetFileTypeToBinary() if binary else w.SetFileTypeToASCII()
    w.Write()
legacy(fill(rect()),vtk.vtkRectilinearGridWriter,'rectilinear-ascii.vtk',0)
legacy(fill(rect()),vtk.vtkRectilinearGridWriter,'rectilinear-binary.vtk',1)
legacy(fill(image()),vtk.vtkStructuredPointsWriter,'points-ascii.vtk',0)
legacy(fill(image()),vtk.vtkStructuredPointsWriter,'points-binary.vtk',1)
def xml(g,cls,name,mode,comp=None,head=32,order=None,enc=None,block=None):
    w=cls(); w.SetInputData(g); w.SetFileName(f'{out}/{name}')
    getattr(w,'SetDataModeTo'+mode)()
    if comp: w.SetCompressorTypeToZLib()
    else: w.SetCompressorTypeToNone()
    w.SetHeaderTypeToUInt64() if head==64 else w.SetHeaderTypeToUInt32()
    if order=='big': w.SetByteOrderToBigEndian()
    if enc is not None: w.SetEncodeAppendedData(enc)
    if block: w.SetBlockSize(block)
    w.Write()
R=vtk.vtkXMLRectilinearGridWriter; I=vtk.vtkXMLImageDataWriter
xml(fill(rect()),R,'ascii.vtr','Ascii')
xml(fill(rect()),R,'binary.vtr','Binary')
xml(fill(rect()),R,'binary-zlib64.vtr','Binary',1,64,block=64)
xml(fill(rect()),R,'binary-big64.vtr','Binary',0,64,'big')
xml(fill(rect()),R,'appended-raw.vtr','Appended',0,64,enc=0)
xml(fill(rect()),R,'appended-raw-zlib.vtr','Appended',1,32,'big',enc=0,block=64)
xml(fill(rect()),R,'appended-base64-zlib.vtr','Appended',1,64,enc=1,block=64)
xml(fill(rect()),R,'appended-base64.vtr','Appended',0,32,enc=1)
xml(fill(image()),I,'ascii.vti','Ascii')
xml(fill(image()),I,'binary-zlib.vti','Binary',1,32)
xml(fill(image()),I,'appended-raw.vti','Appended',0,32,enc=0)
xml(fill(image(),np.float32,False),I,'single.vti','Binary',0,32)
