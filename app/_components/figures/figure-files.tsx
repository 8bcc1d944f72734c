'use client';

/** Saves a figure: its unrounded numbers as CSV, its drawing as SVG or PNG. */
import { type MouseEvent, useState } from 'react';
import { drawPng, findDrawing, nameFile, saveFile, writeSvg } from '@/app/_lib/picture-file';
import type { FigureTable } from '@/lib/brief/types';
import { Button } from '../controls/button';
import styles from './figure-frame.module.css';

interface FigureFilesProps {
  table: FigureTable;
  /** The caption as plain text: what the picture says of itself. */
  description: string;
  /** The figure has a drawing; one made of bars of text has only its numbers. */
  isDrawn: boolean;
}

type Format = 'csv' | 'svg' | 'png';

export function FigureFiles({ table, description, isDrawn }: FigureFilesProps) {
  const [hasFailed, setHasFailed] = useState(false);
  const formats: Format[] = isDrawn ? ['csv', 'svg', 'png'] : ['csv'];
  const save = async (format: Format, figure: Element | null) => {
    const content =
      format === 'csv'
        ? await writeNumbers(table)
        : await writePicture(figure, format, { title: table.title, description });
    setHasFailed(content === null);
    if (content) saveFile(nameFile(table.title, format), content);
  };
  const press = (format: Format) => (event: MouseEvent) =>
    save(format, event.currentTarget.closest('figure'));
  return (
    <p className={styles.files} data-screen-only>
      <span>Save as</span>
      {formats.map((format) => (
        <Button
          key={format}
          kind="text"
          aria-label={`${format.toUpperCase()}: ${table.title}`}
          onClick={press(format)}
        >
          {format.toUpperCase()}
        </Button>
      ))}
      {hasFailed ? (
        <span role="alert">This browser could not draw the picture; the numbers can be saved as CSV.</span>
      ) : null}
    </p>
  );
}

/** The writer shields what a spreadsheet would run as a formula; it is fetched when it is asked for. */
async function writeNumbers({ columns, raw }: FigureTable): Promise<Blob> {
  const { writeCsv } = await import('@/lib/series/export-series');
  const rows = raw.map((cells) => cells.map((cell) => cell ?? ''));
  return new Blob(['\uFEFF', writeCsv([columns, ...rows])], { type: 'text/csv;charset=utf-8' });
}

async function writePicture(
  figure: Element | null,
  format: 'svg' | 'png',
  words: { title: string; description: string },
): Promise<Blob | null> {
  const drawing = figure && findDrawing(figure);
  if (!drawing) return null;
  const text = writeSvg(drawing, words);
  return format === 'svg' ? new Blob([text], { type: 'image/svg+xml' }) : drawPng(text);
}
