using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Calibration;

/// <summary>Thirteen real captures of Debian's package opencv-doc against what OpenCV 4.13 reaches on them with the same terms and its own corner finder.</summary>
public class Real_boards_calibrate_as_well_as_OpenCV_does(ITestOutputHelper output)
{
    [SkippableFact]
    public void Reprojection_epipolar_distance_and_sides_are_within_two_per_cent_or_better()
    {
        var calibration = BoardData.Real;
        output.WriteLine(
            $"stereo {calibration.StereoRmsPx:0.0000} px, baseline {calibration.Rig.BaselineMm:0.000} mm, epipolar {calibration.EpipolarRmsPx:0.0000} px, sides {calibration.SideRmsMm:0.0000} mm");
        output.WriteLine(
            $"left out: reprojection {calibration.LeaveOneOut.ReprojectionRmsPx:0.0000} px, epipolar {calibration.LeaveOneOut.EpipolarRmsPx:0.0000} px, sides {calibration.LeaveOneOut.SideRmsMm:0.0000} mm");

        // Source: a run of OpenCV 4.13 on the same pictures (corner window 11, five terms a camera, both cameras freed in the joint step).
        Assert.Equal(13, calibration.Views.Count(view => view.Used));
        Assert.InRange(calibration.StereoRmsPx, 0.1, 1.02 * 0.215);
        Assert.InRange(calibration.EpipolarRmsPx, 0.1, 1.02 * 0.173);
        Assert.InRange(calibration.SideRmsMm, 0.1, 1.02 * 0.203);
        Assert.Equal(83.20, calibration.Rig.BaselineMm, 0.02 * 83.20);
    }

    [SkippableFact]
    public void Views_that_were_left_out_are_explained_nearly_as_well()
    {
        var (calibration, held) = (BoardData.Real, BoardData.Real.LeaveOneOut);
        Assert.Equal(13, held.Views.Length);
        Assert.InRange(held.ReprojectionRmsPx, calibration.StereoRmsPx, 1.3 * calibration.StereoRmsPx);
        Assert.InRange(held.SideRmsMm, calibration.SideRmsMm, 1.3 * calibration.SideRmsMm);

        // 25 mm is what the captures' own description states. A rig's scale is known to its uncertainty.
        Assert.All(held.Views, view => Assert.Equal(25, view.SideMeanMm, 0.25));
    }

    [SkippableFact]
    public void Focal_lengths_agree_with_the_published_ones_within_one_per_cent()
    {
        // Source: intrinsics.yml beside the captures, in the same package.
        var published = MatrixStorage.Read(OpenData.Find("published/intrinsics.yml"), ["M1", "D1", "M2", "D2"]);
        var size = new PictureSize(640, 480);
        foreach (var (camera, theirs) in new[]
        {
            (BoardData.Real.Rig.Left, published.Camera("M1", "D1", size)), (BoardData.Real.Rig.Right, published.Camera("M2", "D2", size)),
        })
        {
            Assert.Equal(1, camera.Matrix.FocalU / theirs.Matrix.FocalU, 0.01);
            Assert.Equal(1, camera.Matrix.FocalV / theirs.Matrix.FocalV, 0.01);
        }
    }

    // 13 views of 54 corners; nine parameters of the camera and six of each view's pose.
    private static readonly double PointsForCoordinates = Math.Sqrt((13.0 * 54 - 9 - 6 * 13) / (2.0 * 13 * 54 - 9 - 6 * 13));

    [SkippableFact]
    public void Standard_deviations_agree_with_OpenCVs_within_ten_per_cent()
    {
        // Source: cv2.calibrateCameraExtended of Debian's python3-opencv 4.6.0 on the same corners (refinement window a third of the spacing),
        // which gives deviations of single cameras: fu, fv, cu, cv, k1, k2, p1, p2, k3. That version counts points where the degrees of freedom
        // are coordinates (mended in 4.7 after its issue 19803), so its figures are carried over by the ratio of the two counts.
        Agree(BoardData.Real.SingleLeft, 0.178112, [0.584255, 0.612079, 0.617009, 0.680401, 0.00722647, 0.0553519, 0.000148867, 0.000187695, 0.118026]);
        Agree(BoardData.Real.SingleRight, 0.183005, [0.623333, 0.604735, 0.673729, 0.678988, 0.00439017, 0.0203283, 0.000137653, 0.000319433, 0.029636]);

        void Agree(CameraCalibration ours, double rms, double[] theirs)
        {
            Assert.Equal(1, ours.RmsPx / rms, 0.01);
            Assert.All(theirs, (sigma, i) => Assert.Equal(1, ours.StandardUncertainty(i) / (PointsForCoordinates * sigma), 0.1));
        }
    }
}
