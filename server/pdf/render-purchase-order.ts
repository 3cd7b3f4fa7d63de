import type { OrderContent } from '#shared/contracts/orders'
import type { TableContent } from '#shared/drawing/table'
import { formatMoney, formatNumber } from '#shared/number-format'
import { layOutDocument, type Part } from './document'
import { renderPages } from './render-sheets'

export interface PurchaseOrderPdf {
  content: OrderContent
  /** SHA-256 of the canonical bytes of the content, 64 hexadecimal digits. */
  sha256: string
  /** The canonical bytes themselves, attached so that the vendor's system can read what a person sees. */
  bytes: Uint8Array
}

/** A purchase order as PDF/A-3b on A4. Amounts are printed as they are kept, to the last decimal; nothing is added up here. */
export function renderPurchaseOrderPdf({ content, sha256, bytes }: PurchaseOrderPdf): Promise<Buffer> {
  const pages = layOutDocument({
    title: 'Purchase order',
    reference: content.revision > 0 ? `${content.number} rev ${content.revision}` : content.number,
    sender: content.buyer.legalEntity,
    footer: `Purchase order ${content.number}. SHA-256 of the attached record: ${sha256}`,
    parts: orderParts(content),
  })
  return renderPages({
    pages,
    info: {
      title: `Purchase order ${content.number}`,
      subject: `Order of ${content.buyer.legalEntity} to ${content.vendor.name}`,
      author: content.buyer.legalEntity,
      language: 'en',
      date: new Date(`${content.date}T00:00:00Z`),
    },
    attachment: { name: 'purchase-order.json', bytes, description: 'The purchase order as canonical JSON' },
  })
}

function orderParts(order: OrderContent): Part[] {
  const { buyer, vendor, quotation } = order
  return [
    {
      kind: 'fields',
      title: 'Parties',
      fields: [
        ['Vendor', joinLines(vendor.name, vendor.address)],
        ['Vendor number', vendor.number],
        ['Buyer', buyer.legalEntity],
        ['VAT number', buyer.vatNumber],
        ['Invoice to', buyer.billTo],
        ['Deliver to', buyer.shipTo],
        ['Contact', joinLines(buyer.contactName, buyer.contactEmail)],
      ],
    },
    {
      kind: 'fields',
      title: 'Order',
      fields: [
        ['Date', order.date],
        ['Request for quotation', order.rfqNumber],
        ['Your quotation', `${quotation.reference}, revision ${quotation.revision}, valid until ${quotation.validUntil}`],
        ['SHA-256 of the quotation', quotation.sha256],
        ['Acknowledge by', order.acknowledgeBy],
      ],
    },
    { kind: 'table', content: linesTable(order) },
    ...(order.oneTimeCosts.length > 0 ? [{ kind: 'table' as const, content: oneTimeTable(order) }] : []),
    { kind: 'fields', title: 'Total', fields: [['Total of pieces and one-time cost', formatMoney(order.total, order.currency)]] },
    { kind: 'fields', title: 'Drawings', fields: order.lines.map((line) => [`${line.partNumber} rev ${line.drawingRevision}`, `SHA-256 ${line.specificationSha256}`] as const) },
    { kind: 'fields', title: 'Delivery and payment', fields: deliveryFields(order) },
    { kind: 'paragraph', text: `Please acknowledge this order by ${order.acknowledgeBy}: accepted, accepted with changes, or refused. An acknowledgement with changes is a new offer and binds nobody until it is agreed.` },
    { kind: 'paragraph', text: 'Each part is made to exactly the drawing revision named above. A change of revision, material, process, site or sub-supplier needs written approval before it is made.' },
  ]
}

const joinLines = (...lines: string[]) => lines.filter((line) => line !== '').join('\n')

function deliveryFields(order: OrderContent): [string, string][] {
  return [
    ['Delivery date', order.deliveryOn],
    ['Delivery terms (Incoterms 2020)', `${order.deliveryRule} ${order.deliveryPlace}`],
    ['Carrier', order.carrier],
    ['Over or under delivery', order.overUnderPercent === 0 ? 'not accepted' : `up to ${formatNumber(order.overUnderPercent)} %`],
    ['Payment terms', order.paymentTerms],
    ['Packing and labels', order.packing],
    ['Documents to accompany', order.documents],
    ['Quality clauses', order.quality],
    ['Tools', order.tooling],
    ['Terms and conditions', order.termsVersion],
    ['Remarks', order.remarks],
  ]
}

function linesTable({ lines, currency }: OrderContent): TableContent {
  return {
    title: 'Parts',
    columns: [
      { key: 'position', header: 'Pos.', align: 'middle', font: 'sans-bold' },
      { key: 'part', header: 'Part' },
      { key: 'revision', header: 'Drawing rev.', align: 'middle' },
      { key: 'quantity', header: 'Quantity', align: 'end' },
      { key: 'price', header: 'Price', align: 'end' },
      { key: 'per', header: 'for', align: 'end' },
      { key: 'origin', header: 'Origin', align: 'middle' },
      { key: 'total', header: 'Amount', align: 'end' },
    ],
    rows: lines.map((line) => ({
      cells: {
        position: String(line.position),
        part: joinLines(line.partNumber, line.description),
        revision: line.drawingRevision,
        quantity: `${formatNumber(line.quantity, { decimals: 0 })}\u00a0${line.unit}`,
        price: formatMoney(line.price, currency),
        per: `${formatNumber(line.priceUnit, { decimals: 0 })}\u00a0${line.unit}`,
        origin: line.countryOfOrigin ?? '',
        total: formatMoney(line.lineTotal, currency),
      },
    })),
  }
}

const oneTimeTable = ({ oneTimeCosts, currency }: OrderContent): TableContent => ({
  title: 'One-time cost',
  columns: [
    { key: 'position', header: 'Pos.', align: 'middle', font: 'sans-bold' },
    { key: 'text', header: 'What it covers', always: true },
    { key: 'amount', header: 'Amount', align: 'end' },
  ],
  rows: oneTimeCosts.map(({ position, text, amount }) => ({ cells: { position: String(position), text, amount: formatMoney(amount, currency) } })),
})
