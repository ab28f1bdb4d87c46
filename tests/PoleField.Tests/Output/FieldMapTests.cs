// Truth: RFC 4180, the written layout of the map's files, and closed forms.
using System.Globalization;
using System.Text;
using System.Text.Json;
using PoleField.Geometry;
using PoleField.Output.Maps;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class FieldMapTests
{
    [Fact]
    public void AGridIncludesItsLastPlaceAndRunsAlongYFirst()
    {
        MapGrid grid = MapGrid.Rectangle(new Point(-1e-3, 3e-3), new Point(1e-3, 3.6e-3), 0.1e-3);

        Assert.Equal((21, 7), (grid.CountY, grid.CountZ));
        Assert.Equal(new Point(-0.9e-3, 3e-3), grid[1]);
        Assert.Equal(new Point(1e-3, 3.6e-3), grid[grid.Count - 1]);
    }

    [Theory]
    [InlineData(1e-3, 0.0, 1e-4)] // to left of from
    [InlineData(0.0, 1e-3, 0.0)] // no step
    [InlineData(0.0, 1e-3, double.NaN)]
    [InlineData(0.0, 1.0, 1e-8)] // too many
    public void AnImpossibleGridIsAFaultOfTheInput(double from, double to, double step) =>
        Assert.Throws<InputException>(() => MapGrid.Rectangle(new Point(from, 0), new Point(to, 1e-3), step));

    [Fact]
    public void TheCsvIsRfc4180WithTheColumnsOfTheFormat()
    {
        string text = Csv(SampleMap.Make());
        string[] lines = text.Split("\r\n");

        Assert.Equal("y_mm,z_mm,By_T,Bz_T,B_T,dB_dy_T_per_m,dB_dz_T_per_m,medium", lines[0]);
        Assert.Equal("", lines[^1]);
        Assert.DoesNotContain('\n', text.Replace("\r\n", "", StringComparison.Ordinal));
        Assert.StartsWith("-0.2,3.5,", lines[1], StringComparison.Ordinal);
        Assert.StartsWith("-0.1,3.5,", lines[2], StringComparison.Ordinal);
        Assert.All(lines[1..^1], line => Assert.Equal(8, Cells(line).Length));
    }

    [Fact]
    public void TheCsvHoldsTheClosedFormToTheLastBit()
    {
        FieldMap map = SampleMap.Make();
        string[] rows = Csv(map).Split("\r\n")[1..^1];

        for (int i = 0; i < rows.Length; i++)
        {
            MapSample exact = map.Samples[i];
            string[] cells = Cells(rows[i]);
            if (exact.Source == MapSource.Extraction)
            {
                double[] read = [.. cells[2..7].Select(c => double.Parse(c, CultureInfo.InvariantCulture))];
                Assert.Equal([exact.By, exact.Bz, exact.Field, exact.DFieldDy, exact.DFieldDz], read);
            }
        }
    }

    [Fact]
    public void WhereThereIsNoValueTheCellIsEmptyAndOddLayerNamesAreQuoted()
    {
        string[] rows = Csv(SampleMap.Make()).Split("\r\n");

        Assert.Contains(rows, r => r.EndsWith(",,,,,,", StringComparison.Ordinal)); // outside the model
        Assert.Contains(rows, r => r.EndsWith(",,,\"POLE, \"\"A\"\"\"", StringComparison.Ordinal)); // field without gradient in a part
    }

    [Fact]
    public void TheSidecarNamesUnitsGridAndOrigin()
    {
        using MemoryStream stream = new();
        CsvMap.WriteSidecar(SampleMap.Make(), stream);
        using JsonDocument document = JsonDocument.Parse(stream.ToArray());
        JsonElement root = document.RootElement;

        Assert.Equal(new string('5', 64), root.GetProperty("sketch_sha256").GetString());
        Assert.Equal(8, root.GetProperty("columns").GetArrayLength());
        Assert.Equal("T/m", root.GetProperty("columns")[6].GetProperty("unit").GetString());
        Assert.Equal(0.1, root.GetProperty("places").GetProperty("step_mm")[0].GetDouble());
        Assert.Equal(5, root.GetProperty("places").GetProperty("count")[0].GetInt32());
        Assert.Equal(1e-4, root.GetProperty("accuracy_reached").GetDouble());
        Assert.Equal(1, root.GetProperty("values").GetProperty("none").GetInt32());
    }

    [Fact]
    public void TheGradientOfTheMagnitudeFollowsFromTheTensor()
    {
        Point p = new(0.7e-3, 4.4e-3);
        const double step = 1e-7;

        MapSample sample = MapSample.From(TwoConductorScene.At(p));
        double quotient = (TwoConductorScene.At(p + new Point(step, 0)).Field - TwoConductorScene.At(p - new Point(step, 0)).Field) / (2 * step);

        Assert.Equal(quotient, sample.DFieldDy, 1e-5 * Math.Abs(quotient)); // central difference, h² of the third derivative
        Assert.Equal(TwoConductorScene.At(p).Gradient, sample.DFieldDz, 1e-12);
    }

    [Fact]
    public void MapsAreTheSameBytesEveryTime()
    {
        Assert.Equal(Bytes(s => OpenPmdMap.Write(SampleMap.Make(), s)), Bytes(s => OpenPmdMap.Write(SampleMap.Make(), s)));
        Assert.Equal(Bytes(s => CsvMap.Write(SampleMap.Make(), s)), Bytes(s => CsvMap.Write(SampleMap.Make(), s)));
    }

    [Fact]
    public void AListOfPlacesHasNoOpenPmdForm()
    {
        FieldMap list = FieldMap.Sample(MapGrid.Places([new Point(0, 5e-3)]), p => MapSample.From(TwoConductorScene.At(p)), SampleMap.Origin);

        Assert.Throws<InputException>(() => OpenPmdMap.Write(list, Stream.Null));
    }

    private static string Csv(FieldMap map) => new UTF8Encoding(false, true).GetString(Bytes(s => CsvMap.Write(map, s)));

    private static byte[] Bytes(Action<Stream> write)
    {
        using MemoryStream stream = new();
        write(stream);
        return stream.ToArray();
    }

    // A reader of its own for the rows of RFC 4180.
    private static string[] Cells(string row)
    {
        List<string> cells = [];
        StringBuilder cell = new();
        bool quoted = false;
        for (int i = 0; i < row.Length; i++)
        {
            if (row[i] == '"' && quoted && i + 1 < row.Length && row[i + 1] == '"')
            {
                cell.Append(row[++i]);
            }
            else if (row[i] == '"')
            {
                quoted = !quoted;
            }
            else if (row[i] == ',' && !quoted)
            {
                cells.Add(cell.ToString());
                cell.Clear();
            }
            else
            {
                cell.Append(row[i]);
            }
        }

        cells.Add(cell.ToString());
        return [.. cells];
    }
}
