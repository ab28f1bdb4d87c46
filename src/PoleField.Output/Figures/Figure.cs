using OxyPlot;

namespace PoleField.Output.Figures;

/// <summary>A finished picture: the plot with the room its title, key and caption need.</summary>
/// <param name="Name">Short name for files and page anchors: lower-case letters and hyphens.</param>
/// <param name="Title">What is shown, one line; also the picture's name for screen readers.</param>
/// <param name="Caption">The numbers and the reading help, one or a few sentences.</param>
/// <param name="Model">The plot.</param>
/// <param name="Width">Width, points of 1/96 inch.</param>
/// <param name="Height">Height, points of 1/96 inch.</param>
public sealed record Figure(string Name, string Title, string Caption, PlotModel Model, double Width, double Height)
{
    /// <summary>Height of the title at the top, points; a page that writes the title as text leaves it out.</summary>
    public double TitleHeight { get; init; }

    /// <summary>Height of the caption at the bottom, points; likewise.</summary>
    public double CaptionHeight { get; init; }
}
