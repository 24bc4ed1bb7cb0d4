using System.Runtime.InteropServices;
using System.Runtime.InteropServices.Marshalling;

namespace GeoCulvert.Layers;

/// <summary>GDAL's C API as far as the program uses it (gdal.h, ogr_api.h, ogr_srs_api.h, gdal_utils.h, cpl_*.h).</summary>
internal static unsafe partial class Native
{
    private const string L = GdalLibrary.Name;
    private const StringMarshalling U = StringMarshalling.Utf8;

    [LibraryImport(L)] public static partial void GDALAllRegister();
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALVersionInfo(string request);
    [LibraryImport(L)] public static partial nint CPLSetErrorHandler(delegate* unmanaged<int, int, nint, void> handler);
    [LibraryImport(L, StringMarshalling = U)] public static partial void CPLSetConfigOption(string key, string? value);
    [LibraryImport(L)] public static partial void VSIFree(nint memory);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint VSIGetMemFileBuffer(string path, ulong* length, int takeOver);
    [LibraryImport(L, StringMarshalling = U)] public static partial int VSIUnlink(string path);

    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALOpenEx(string path, uint flags, nint drivers, nint options, nint siblings);
    [LibraryImport(L)] public static partial void GDALClose(nint dataset);
    [LibraryImport(L)] public static partial void GDALFlushCache(nint dataset);
    [LibraryImport(L)] public static partial int GDALGetRasterXSize(nint dataset);
    [LibraryImport(L)] public static partial int GDALGetRasterYSize(nint dataset);
    [LibraryImport(L)] public static partial int GDALGetRasterCount(nint dataset);
    [LibraryImport(L)] public static partial int GDALGetGeoTransform(nint dataset, double* six);
    [LibraryImport(L)] public static partial int GDALSetGeoTransform(nint dataset, double* six);
    [LibraryImport(L)] public static partial nint GDALGetSpatialRef(nint dataset);
    [LibraryImport(L)] public static partial int GDALSetSpatialRef(nint dataset, nint srs);
    [LibraryImport(L)] public static partial nint GDALGetRasterBand(nint dataset, int band);
    [LibraryImport(L)] public static partial int GDALGetRasterDataType(nint band);
    [LibraryImport(L)] public static partial int GDALGetRasterColorInterpretation(nint band);
    [LibraryImport(L)] public static partial nint GDALGetFileList(nint dataset);
    [LibraryImport(L)] public static partial nint GDALGetDatasetDriver(nint dataset);
    [LibraryImport(L)] public static partial nint GDALGetDescription(nint target);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALGetMetadataItem(nint target, string name, string domain);
    [LibraryImport(L)] public static partial void GDALGetBlockSize(nint band, int* width, int* height);
    [LibraryImport(L)] public static partial void CSLDestroy(nint list);
    [LibraryImport(L)] public static partial double GDALGetRasterNoDataValue(nint band, int* has);
    [LibraryImport(L)] public static partial int GDALSetRasterNoDataValue(nint band, double value);
    [LibraryImport(L)] public static partial nint GDALGetRasterUnitType(nint band);
    [LibraryImport(L, StringMarshalling = U)] public static partial int GDALSetRasterUnitType(nint band, string unit);
    [LibraryImport(L)] public static partial double GDALGetRasterScale(nint band, int* has);
    [LibraryImport(L)] public static partial double GDALGetRasterOffset(nint band, int* has);
    [LibraryImport(L, StringMarshalling = U)] public static partial void GDALSetDescription(nint target, string text);
    [LibraryImport(L)] public static partial int GDALRasterIO(nint band, int write, int x, int y, int width, int height, void* buffer, int bufferWidth, int bufferHeight, int type, int pixelSpace, int lineSpace);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALGetDriverByName(string name);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALCreate(nint driver, string path, int width, int height, int bands, int type, nint options);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALCreateCopy(nint driver, string path, nint source, int strict, nint options, nint progress, nint data);
    [LibraryImport(L)] public static partial nint GDALWarpAppOptionsNew(nint arguments, nint forBinary);
    [LibraryImport(L)] public static partial void GDALWarpAppOptionsFree(nint options);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALWarp(string path, nint dataset, int sources, nint* source, nint options, int* usageError);
    [LibraryImport(L)] public static partial nint GDALTranslateOptionsNew(nint arguments, nint forBinary);
    [LibraryImport(L)] public static partial void GDALTranslateOptionsFree(nint options);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALTranslate(string path, nint dataset, nint options, int* usageError);
    [LibraryImport(L)] public static partial nint GDALBuildVRTOptionsNew(nint arguments, nint forBinary);
    [LibraryImport(L)] public static partial void GDALBuildVRTOptionsFree(nint options);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALBuildVRT(string path, int sources, nint* datasets, nint names, nint options, int* usageError);

    [LibraryImport(L)] public static partial nint OSRNewSpatialReference(nint wkt);
    [LibraryImport(L, StringMarshalling = U)] public static partial int OSRSetFromUserInput(nint srs, string text);
    [LibraryImport(L)] public static partial void OSRSetAxisMappingStrategy(nint srs, int strategy);
    [LibraryImport(L)] public static partial nint OSRClone(nint srs);
    [LibraryImport(L)] public static partial void OSRRelease(nint srs);
    [LibraryImport(L)] public static partial int OSRIsGeographic(nint srs);
    [LibraryImport(L)] public static partial int OSRIsProjected(nint srs);
    [LibraryImport(L)] public static partial double OSRGetLinearUnits(nint srs, nint* name);
    [LibraryImport(L, StringMarshalling = U)] public static partial double OSRGetTargetLinearUnits(nint srs, string key, nint* name);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint OSRGetAttrValue(nint srs, string node, int child);
    [LibraryImport(L)] public static partial nint OSRCloneGeogCS(nint srs);
    [LibraryImport(L)] public static partial double OSRGetSemiMajor(nint srs, int* error);
    [LibraryImport(L)] public static partial double OSRGetInvFlattening(nint srs, int* error);
    [LibraryImport(L)] public static partial double OSRGetAngularUnits(nint srs, nint* name);
    [LibraryImport(L)] public static partial int OSRIsCompound(nint srs);
    [LibraryImport(L)] public static partial int OSRStripVertical(nint srs);
    [LibraryImport(L)] public static partial int OSRGetAxesCount(nint srs);
    [LibraryImport(L)] public static partial int OSRDemoteTo2D(nint srs, nint name);
    [LibraryImport(L)] public static partial nint OSRGetName(nint srs);
    [LibraryImport(L)] public static partial int OSRIsSame(nint a, nint b);
    [LibraryImport(L)] public static partial nint OSRGetAuthorityName(nint srs, nint key);
    [LibraryImport(L)] public static partial nint OSRGetAuthorityCode(nint srs, nint key);
    [LibraryImport(L)] public static partial int OSRAutoIdentifyEPSG(nint srs);
    [LibraryImport(L)] public static partial int OSRExportToWktEx(nint srs, nint* text, nint options);
    [LibraryImport(L)] public static partial nint OCTNewCoordinateTransformation(nint from, nint to);
    [LibraryImport(L)] public static partial nint OCTNewCoordinateTransformationEx(nint from, nint to, nint options);
    [LibraryImport(L)] public static partial nint OCTNewCoordinateTransformationOptions();
    [LibraryImport(L)] public static partial int OCTCoordinateTransformationOptionsSetDesiredAccuracy(nint options, double metres);
    [LibraryImport(L)] public static partial int OCTCoordinateTransformationOptionsSetBallparkAllowed(nint options, int allowed);
    [LibraryImport(L)] public static partial void OCTDestroyCoordinateTransformationOptions(nint options);
    [LibraryImport(L)] public static partial void OCTDestroyCoordinateTransformation(nint transform);
    [LibraryImport(L)] public static partial int OCTTransform(nint transform, int count, double* x, double* y, double* z);

    [LibraryImport(L)] public static partial int GDALDatasetGetLayerCount(nint dataset);
    [LibraryImport(L)] public static partial nint GDALDatasetGetLayer(nint dataset, int index);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALDatasetGetLayerByName(nint dataset, string name);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALDatasetCreateLayer(nint dataset, string name, nint srs, int type, nint options);
    [LibraryImport(L)] public static partial int GDALDatasetStartTransaction(nint dataset, int force);
    [LibraryImport(L)] public static partial int GDALDatasetCommitTransaction(nint dataset);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint GDALDatasetExecuteSQL(nint dataset, string sql, nint filter, nint dialect);
    [LibraryImport(L)] public static partial void GDALDatasetReleaseResultSet(nint dataset, nint layer);
    [LibraryImport(L)] public static partial nint OGR_L_GetName(nint layer);
    [LibraryImport(L)] public static partial nint OGR_L_GetSpatialRef(nint layer);
    [LibraryImport(L, StringMarshalling = U)] public static partial int OGR_L_SetAttributeFilter(nint layer, string? where);
    [LibraryImport(L)] public static partial void OGR_L_ResetReading(nint layer);
    [LibraryImport(L)] public static partial nint OGR_L_GetNextFeature(nint layer);
    [LibraryImport(L)] public static partial nint OGR_L_GetLayerDefn(nint layer);
    [LibraryImport(L)] public static partial int OGR_L_CreateField(nint layer, nint field, int approximate);
    [LibraryImport(L)] public static partial int OGR_L_CreateFeature(nint layer, nint feature);
    [LibraryImport(L)] public static partial int OGR_FD_GetFieldCount(nint definition);
    [LibraryImport(L)] public static partial nint OGR_FD_GetFieldDefn(nint definition, int index);
    [LibraryImport(L)] public static partial nint OGR_Fld_GetNameRef(nint field);
    [LibraryImport(L)] public static partial int OGR_Fld_GetType(nint field);
    [LibraryImport(L, StringMarshalling = U)] public static partial nint OGR_Fld_Create(string name, int type);
    [LibraryImport(L)] public static partial void OGR_Fld_Destroy(nint field);
    [LibraryImport(L)] public static partial void OGR_Fld_SetSubType(nint field, int type);
    [LibraryImport(L)] public static partial nint OGR_F_Create(nint definition);
    [LibraryImport(L)] public static partial void OGR_F_Destroy(nint feature);
    [LibraryImport(L)] public static partial long OGR_F_GetFID(nint feature);
    [LibraryImport(L)] public static partial nint OGR_F_GetGeometryRef(nint feature);
    [LibraryImport(L)] public static partial int OGR_F_IsFieldSetAndNotNull(nint feature, int field);
    [LibraryImport(L)] public static partial nint OGR_F_GetFieldAsString(nint feature, int field);
    [LibraryImport(L)] public static partial double OGR_F_GetFieldAsDouble(nint feature, int field);
    [LibraryImport(L)] public static partial long OGR_F_GetFieldAsInteger64(nint feature, int field);
    [LibraryImport(L, StringMarshalling = U)] public static partial void OGR_F_SetFieldString(nint feature, int field, string value);
    [LibraryImport(L)] public static partial void OGR_F_SetFieldDouble(nint feature, int field, double value);
    [LibraryImport(L)] public static partial void OGR_F_SetFieldInteger64(nint feature, int field, long value);
    [LibraryImport(L)] public static partial void OGR_F_SetFieldInteger(nint feature, int field, int value);
    [LibraryImport(L)] public static partial void OGR_F_SetFieldNull(nint feature, int field);
    [LibraryImport(L)] public static partial int OGR_F_SetGeometryDirectly(nint feature, nint geometry);
    [LibraryImport(L)] public static partial nint OGR_G_GetLinearGeometry(nint geometry, double step, nint options);
    [LibraryImport(L)] public static partial int OGR_G_WkbSize(nint geometry);
    [LibraryImport(L)] public static partial int OGR_G_ExportToIsoWkb(nint geometry, int order, byte* buffer);
    [LibraryImport(L)] public static partial int OGR_G_CreateFromWkb(byte* wkb, nint srs, nint* geometry, int length);
    [LibraryImport(L)] public static partial void OGR_G_DestroyGeometry(nint geometry);

    /// <summary>The text behind a pointer that GDAL keeps.</summary>
    public static string Text(nint pointer) => Utf8StringMarshaller.ConvertToManaged((byte*)pointer) ?? "";
}

/// <summary>A null-terminated list of UTF-8 strings for GDAL, freed at the end of its scope.</summary>
internal readonly struct NativeList : IDisposable
{
    private readonly nint[]? _texts;

    public NativeList(params IReadOnlyList<string> items)
    {
        _texts = [.. items.Select(Marshal.StringToCoTaskMemUTF8)];
        Pointer = Marshal.AllocHGlobal((_texts.Length + 1) * nint.Size);
        Marshal.Copy(_texts, 0, Pointer, _texts.Length);
        Marshal.WriteIntPtr(Pointer, _texts.Length * nint.Size, 0);
    }

    public nint Pointer { get; }

    public void Dispose()
    {
        if (_texts is null) return; // the default value: no list, pointer 0, which GDAL takes as an empty one
        foreach (var text in _texts) Marshal.FreeCoTaskMem(text);
        Marshal.FreeHGlobal(Pointer);
    }
}
