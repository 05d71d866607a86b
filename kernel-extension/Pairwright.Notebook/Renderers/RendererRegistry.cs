namespace Pairwright.Notebook.Renderers;

/// <summary>The one place where renderers are registered: add a line here for each typed object that draws itself.</summary>
internal static class RendererRegistry
{
    private static readonly IRenderer[] All =
    [
        new StereoPairRenderer(),
        new CameraRenderer(),
        new RigRenderer(),
        new FundamentalMatrixRenderer(),
        new EssentialMatrixRenderer(),
        new EpipolarLineRenderer(),
        new EpipolarDrawingRenderer(),
        new RectifiedPairRenderer(),
        new CostCurveRenderer(),
        new DisparityMapRenderer(),
        new DepthMapRenderer(),
        new PointCloudRenderer(),
        new MeasuredPointsRenderer(),
        new NumberSpreadRenderer(),
        new ComparedValuesRenderer(),
        new PlaneFitRenderer(),
        new QuadraticFitRenderer(),
        new RigCalibrationRenderer(),
        new RigCheckRenderer(),
        new MeasuredValueRenderer(),
        new MeasuredValueListRenderer(),
        new VerdictRenderer(),
        new VerdictListRenderer(),
    ];

    /// <summary>Registers every renderer of this extension with the notebook's formatters. Registering twice does no harm.</summary>
    public static void RegisterAll()
    {
        foreach (var renderer in All)
        {
            renderer.Register();
        }
    }
}
